import { zodResolver } from "@hookform/resolvers/zod";
import { useQuery } from "@tanstack/react-query";
import { useForm } from "react-hook-form";
import { Navigate, useSearchParams } from "react-router-dom";
import { SignInInput } from "../../../shared/contracts/session.ts";
import { Button } from "../../components/Button.tsx";
import { FormError, FormTextField } from "../../components/formFields.tsx";
import { Notice } from "../../components/Notice.tsx";
import { showServerErrors } from "../../lib/form.ts";
import { returnAddress } from "../../lib/session.tsx";
import { sessionQuery } from "../../lib/sessionQuery.ts";
import { Entrance } from "../../shell/Entrance.tsx";
import { useSignIn } from "./queries.ts";

/** Sign in, then go on to the address that asked for it. */
export function SignInPage() {
  const [search] = useSearchParams();
  const session = useQuery(sessionQuery);
  const signIn = useSignIn();
  const { control, handleSubmit, setError, setFocus, resetField, formState } = useForm({
    resolver: zodResolver(SignInInput),
    defaultValues: { email: "", password: "" },
  });
  if (session.data?.person) return <Navigate to={returnAddress(search)} replace />;

  const submit = handleSubmit((input) =>
    signIn.mutate(input, {
      onError: (error) => {
        resetField("password");
        showServerErrors(error, setError, ["email", "password"]);
        setFocus("password");
      },
    }),
  );
  return (
    <Entrance title="Sign in" lead={search.has("to") ? "You'll come back to the page you asked for." : undefined}>
      <form noValidate onSubmit={submit} className="space-y-5">
        <FormError message={formState.errors.root?.server?.message} />
        {session.isError && <Notice kind="wrong">{session.error.message}</Notice>}
        <FormTextField control={control} name="email" label="E-mail" type="email" autoComplete="username" autoFocus />
        <FormTextField control={control} name="password" label="Password" type="password" autoComplete="current-password" />
        <Button type="submit" kind="primary" isPending={signIn.isPending} className="w-full">
          Sign in
        </Button>
      </form>
      <p className="mt-8 text-sm text-muted">
        No account, or the password is lost? An administrator of your department can give you a sign-in link that works once.
      </p>
    </Entrance>
  );
}
