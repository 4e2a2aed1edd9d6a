import { zodResolver } from "@hookform/resolvers/zod";
import { useQuery } from "@tanstack/react-query";
import { useState } from "react";
import { useForm } from "react-hook-form";
import { useNavigate, useParams } from "react-router-dom";
import { AcceptLinkInput, PASSWORD_MINIMUM_LENGTH } from "../../../shared/contracts/session.ts";
import { formatDateTime } from "../../../shared/format.ts";
import { Button } from "../../components/Button.tsx";
import { Checkbox } from "../../components/Checkbox.tsx";
import { FormError, FormTextField } from "../../components/formFields.tsx";
import { LinkButton } from "../../components/LinkButton.tsx";
import { Notice } from "../../components/Notice.tsx";
import { PageLoading } from "../../components/PageLoading.tsx";
import { messageOf, showServerErrors } from "../../lib/form.ts";
import { ApiError } from "../../lib/request.ts";
import { Entrance } from "../../shell/Entrance.tsx";
import { signInLinkQuery, useAcceptLink } from "./queries.ts";

/** Behind a one-time link: the person chooses a password and is signed in. */
export function WelcomePage() {
  const { token = "" } = useParams();
  const link = useQuery(signInLinkQuery(token));
  if (link.isPending) return <PageLoading what="your link" />;
  if (link.isError) {
    const isGone = link.error instanceof ApiError && link.error.problem.status === 404;
    return (
      <Entrance title={isGone ? "This link no longer works" : "The link can't be checked now"}>
        <Notice kind="wrong">
          {isGone
            ? "A sign-in link works once and for a short time, and a newer link replaces it. Nothing was changed. Ask an administrator of your department for a new one."
            : messageOf(link.error)}
        </Notice>
        <div className="mt-6 flex gap-3">
          {isGone ? (
            <LinkButton to="/sign-in">Go to sign-in</LinkButton>
          ) : (
            <Button onPress={() => void link.refetch()}>Try again</Button>
          )}
        </div>
      </Entrance>
    );
  }
  return (
    <Entrance
      title={`Welcome, ${link.data.name}`}
      lead={`Choose a password for ${link.data.email}. The link works until ${formatDateTime(link.data.expiresAt)}.`}
    >
      <ChoosePassword token={token} email={link.data.email} />
    </Entrance>
  );
}

function ChoosePassword({ token, email }: { token: string; email: string }) {
  const navigate = useNavigate();
  const accept = useAcceptLink(token);
  const [isVisible, setIsVisible] = useState(false);
  const { control, handleSubmit, setError, formState } = useForm({
    resolver: zodResolver(AcceptLinkInput),
    defaultValues: { password: "" },
  });
  const submit = handleSubmit((input) =>
    accept.mutate(input, {
      onSuccess: () => void navigate("/", { replace: true }),
      onError: (error) => showServerErrors(error, setError, ["password"]),
    }),
  );
  return (
    <form noValidate onSubmit={submit} className="space-y-5">
      <FormError message={formState.errors.root?.server?.message} />
      {/* So that a password manager keeps the password under the right name. */}
      <input type="email" autoComplete="username" value={email} readOnly hidden />
      <FormTextField
        control={control}
        name="password"
        label="New password"
        type={isVisible ? "text" : "password"}
        autoComplete="new-password"
        description={`At least ${PASSWORD_MINIMUM_LENGTH} characters. A few words together do well; spaces are fine.`}
        autoFocus
      />
      <Checkbox isSelected={isVisible} onChange={setIsVisible}>
        Show what I type
      </Checkbox>
      <Button type="submit" kind="primary" isPending={accept.isPending} className="w-full">
        Keep the password and sign in
      </Button>
    </form>
  );
}
