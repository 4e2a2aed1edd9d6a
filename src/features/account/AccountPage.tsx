import { zodResolver } from "@hookform/resolvers/zod";
import { useState } from "react";
import { useForm } from "react-hook-form";
import { ChangePasswordInput, PASSWORD_MINIMUM_LENGTH } from "../../../shared/contracts/session.ts";
import { ROLE_LABELS } from "../../../shared/roles.ts";
import { Button } from "../../components/Button.tsx";
import { Facts } from "../../components/Facts.tsx";
import { FormError, FormTextField } from "../../components/formFields.tsx";
import { Notice } from "../../components/Notice.tsx";
import { Page, Section } from "../../components/Page.tsx";
import { RadioChoices } from "../../components/RadioChoices.tsx";
import { showServerErrors } from "../../lib/form.ts";
import { useSession } from "../../lib/session.tsx";
import { useSignOut } from "../../lib/signOut.ts";
import { chooseTheme, readTheme, type Theme } from "../../lib/theme.ts";
import { useChangePassword } from "./queries.ts";

const THEME_CHOICES: { value: Theme; label: string }[] = [
  { value: "system", label: "As this device says" },
  { value: "light", label: "Light" },
  { value: "dark", label: "Dark" },
];

/** One's own account: who one is here, the password, how pages look. */
export function AccountPage() {
  const { person } = useSession();
  const signOut = useSignOut();
  const [theme, setTheme] = useState(readTheme);
  return (
    <Page
      title="Account"
      actions={
        <Button onPress={() => signOut.mutate()} isPending={signOut.isPending}>
          Sign out
        </Button>
      }
    >
      <div className="measure">
        <Section title="You">
          <Facts
            facts={[
              { label: "Name", value: person.name },
              { label: "E-mail", value: person.email },
              { label: "Roles", value: person.roles.map((role) => ROLE_LABELS[role]).join(", ") },
            ]}
          />
          <p className="mt-3 text-sm text-muted">An administrator changes these.</p>
        </Section>
        <Section title="Password" lead="Your sessions on other devices end when you change it.">
          <PasswordForm email={person.email} />
        </Section>
        <Section title="Look">
          <RadioChoices
            label="Theme"
            description="Kept on this device."
            choices={THEME_CHOICES}
            value={theme}
            onChange={(chosen) => {
              chooseTheme(chosen);
              setTheme(chosen);
            }}
          />
        </Section>
      </div>
    </Page>
  );
}

function PasswordForm({ email }: { email: string }) {
  const change = useChangePassword();
  const { control, handleSubmit, setError, reset, formState } = useForm({
    resolver: zodResolver(ChangePasswordInput),
    defaultValues: { current: "", password: "" },
  });
  const submit = handleSubmit((input) =>
    change.mutate(input, {
      onSuccess: () => reset(),
      onError: (error) => showServerErrors(error, setError, ["current", "password"]),
    }),
  );
  return (
    <form noValidate onSubmit={submit} className="space-y-5">
      <FormError message={formState.errors.root?.server?.message} />
      {change.isSuccess && !formState.isDirty && <Notice kind="done">The new password holds from now on.</Notice>}
      {/* So that a password manager keeps the password under the right name. */}
      <input type="email" autoComplete="username" value={email} readOnly hidden />
      <FormTextField control={control} name="current" label="Present password" type="password" autoComplete="current-password" />
      <FormTextField
        control={control}
        name="password"
        label="New password"
        type="password"
        autoComplete="new-password"
        description={`At least ${PASSWORD_MINIMUM_LENGTH} characters; a few words together do well.`}
      />
      <Button type="submit" kind="primary" isPending={change.isPending}>
        Change the password
      </Button>
    </form>
  );
}
