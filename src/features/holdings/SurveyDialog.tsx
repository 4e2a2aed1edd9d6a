import { zodResolver } from "@hookform/resolvers/zod";
import type { UseMutationResult } from "@tanstack/react-query";
import { useForm } from "react-hook-form";
import { SurveyInput, type SurveyView } from "../../../shared/contracts/holdings.ts";
import { Button } from "../../components/Button.tsx";
import { Dialog } from "../../components/Dialog.tsx";
import { FormError, FormTextField } from "../../components/formFields.tsx";
import { showServerErrors } from "../../lib/form.ts";

interface SurveyFormProps {
  save: string;
  survey?: Pick<SurveyView, "title" | "description">;
  onClose: () => void;
  mutation: UseMutationResult<SurveyView, Error, SurveyInput>;
}

/** A survey's title and description, for a new one or one to change. */
export function SurveyDialog({ title, isOpen, ...form }: SurveyFormProps & { title: string; isOpen: boolean }) {
  return (
    <Dialog title={title} isOpen={isOpen} onClose={form.onClose}>
      <SurveyForm {...form} />
    </Dialog>
  );
}

function SurveyForm({ save, survey, onClose, mutation }: SurveyFormProps) {
  const { control, handleSubmit, setError, formState } = useForm({
    resolver: zodResolver(SurveyInput),
    defaultValues: { title: survey?.title ?? "", description: survey?.description ?? "" },
  });
  const submit = handleSubmit((input) =>
    mutation.mutate(input, {
      onSuccess: onClose,
      onError: (error) => showServerErrors(error, setError, ["title", "description"]),
    }),
  );
  return (
    <form noValidate onSubmit={submit} className="space-y-5">
      <FormError message={formState.errors.root?.server?.message} />
      <FormTextField
        control={control}
        name="title"
        label="Title"
        autoFocus
        description="Of the survey, without the year: each wave is a release of its own."
      />
      <FormTextField
        control={control}
        name="description"
        label="Description"
        rows={4}
        description="Whom it asks, how they were drawn, what to know."
      />
      <div className="flex flex-wrap justify-end gap-3">
        <Button onPress={onClose}>Leave it</Button>
        <Button type="submit" kind="primary" isPending={mutation.isPending}>
          {save}
        </Button>
      </div>
    </form>
  );
}
