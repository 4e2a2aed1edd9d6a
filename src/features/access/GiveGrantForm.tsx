import { zodResolver } from "@hookform/resolvers/zod";
import { useQuery } from "@tanstack/react-query";
import { useForm } from "react-hook-form";
import { GrantInput } from "../../../shared/contracts/access.ts";
import { formatDate } from "../../../shared/format.ts";
import { ROLE_LABELS } from "../../../shared/roles.ts";
import { Button } from "../../components/Button.tsx";
import { FormChooser, FormError, FormTextField } from "../../components/formFields.tsx";
import { Notice } from "../../components/Notice.tsx";
import { messageOf, showServerErrors } from "../../lib/form.ts";
import { candidatesQuery, useGiveGrant } from "./queries.ts";

function inAYear(): string {
  const day = new Date();
  day.setUTCFullYear(day.getUTCFullYear() + 1);
  return day.toISOString().slice(0, 10);
}

/** Whom, for what, until when. */
export function GiveGrantForm({ surveyId }: { surveyId: string }) {
  const candidates = useQuery(candidatesQuery(surveyId));
  const give = useGiveGrant(surveyId);
  const { control, handleSubmit, setError, reset, formState } = useForm({
    resolver: zodResolver(GrantInput),
    defaultValues: { personId: "", purpose: "", endsOn: inAYear() },
  });
  if (candidates.isError) return <Notice kind="wrong">{messageOf(candidates.error)}</Notice>;
  const submit = handleSubmit((input) =>
    give.mutate(input, {
      onSuccess: () => reset(),
      onError: (error) => showServerErrors(error, setError, ["personId", "purpose", "endsOn"]),
    }),
  );
  return (
    <form noValidate onSubmit={submit} className="measure space-y-5">
      <FormError message={formState.errors.root?.server?.message} />
      {give.isSuccess && !formState.isDirty && (
        <Notice kind="done">
          {give.data.person.name} may ask of this survey until {formatDate(give.data.endsOn)}.
        </Notice>
      )}
      <FormChooser
        key={give.data?.id ?? "first"}
        control={control}
        name="personId"
        label="Person"
        placeholder="Type a name"
        choices={(candidates.data?.people ?? []).map(({ id, name, email, roles }) => ({
          id,
          label: name,
          detail: `${roles.map((role) => ROLE_LABELS[role]).join(", ")} · ${email}`,
        }))}
      />
      <FormTextField
        control={control}
        name="purpose"
        label="For what"
        rows={2}
        description="As it should stand in the ledger, such as “Yearly report on smoking”."
      />
      <FormTextField control={control} name="endsOn" label="Last day" type="date" />
      <Button type="submit" kind="primary" isPending={give.isPending}>
        Give access
      </Button>
    </form>
  );
}
