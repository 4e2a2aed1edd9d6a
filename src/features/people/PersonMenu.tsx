import { zodResolver } from "@hookform/resolvers/zod";
import { useState } from "react";
import { useForm } from "react-hook-form";
import type { z } from "zod";
import { PersonChange, type NewSignInLink, type PersonView } from "../../../shared/contracts/people.ts";
import { Button } from "../../components/Button.tsx";
import { ConfirmDialog, Dialog } from "../../components/Dialog.tsx";
import { FormCheckboxGroup, FormError, FormTextField } from "../../components/formFields.tsx";
import { Menu } from "../../components/Menu.tsx";
import { showServerErrors } from "../../lib/form.ts";
import { useChangePerson, useNewLink } from "./queries.ts";
import { ROLE_CHOICES } from "./roleChoices.tsx";

type Sheet = "change" | "deactivate" | "link" | null;

/** What can be done with one account. */
export function PersonMenu({ person, onLink }: { person: PersonView; onLink: (made: z.infer<typeof NewSignInLink>) => void }) {
  const [sheet, setSheet] = useState<Sheet>(null);
  const change = useChangePerson(person.id);
  const newLink = useNewLink(person.id);
  const close = () => {
    setSheet(null);
    change.reset();
    newLink.reset();
  };
  return (
    <>
      <Menu
        label="Change"
        name={`Change ${person.name}`}
        entries={[
          { id: "change", label: "Name and roles", onAction: () => setSheet("change"), isDisabled: !person.can.update },
          {
            id: "link",
            label: "New sign-in link",
            onAction: () => setSheet("link"),
            isDisabled: !person.can.update || !person.isActive,
          },
          person.isActive
            ? {
                id: "deactivate",
                label: "Deactivate",
                onAction: () => setSheet("deactivate"),
                isDisabled: !person.can.deactivate,
              }
            : {
                id: "reactivate",
                label: "Reactivate",
                onAction: () => change.mutate({ isActive: true }),
                isDisabled: !person.can.deactivate,
              },
        ]}
      />
      <Dialog title={person.name} isOpen={sheet === "change"} onClose={close}>
        <ChangeForm person={person} onClose={close} />
      </Dialog>
      <ConfirmDialog
        title={`Deactivate ${person.name}?`}
        isOpen={sheet === "deactivate"}
        onClose={close}
        confirm="Deactivate"
        isDanger
        isPending={change.isPending}
        error={change.error}
        onConfirm={() => change.mutate({ isActive: false }, { onSuccess: close })}
      >
        <p>
          Their sessions end at once and they can't sign in. What they did stays in the ledger. You can reactivate them later.
        </p>
      </ConfirmDialog>
      <ConfirmDialog
        title={`A new sign-in link for ${person.name}?`}
        isOpen={sheet === "link"}
        onClose={close}
        confirm="Make the link"
        isPending={newLink.isPending}
        error={newLink.error}
        onConfirm={() =>
          newLink.mutate(undefined, {
            onSuccess: (made) => {
              onLink(made);
              close();
            },
          })
        }
      >
        <p>
          An earlier link stops working and their sessions end. Their password stays until they choose a new one through the link.
        </p>
      </ConfirmDialog>
    </>
  );
}

function ChangeForm({ person, onClose }: { person: PersonView; onClose: () => void }) {
  const change = useChangePerson(person.id);
  const { control, handleSubmit, setError, formState } = useForm({
    resolver: zodResolver(PersonChange),
    defaultValues: { name: person.name, roles: person.roles },
  });
  const submit = handleSubmit((input) =>
    change.mutate(input, { onSuccess: onClose, onError: (error) => showServerErrors(error, setError, ["name", "roles"]) }),
  );
  return (
    <form noValidate onSubmit={submit} className="space-y-5">
      <FormError message={formState.errors.root?.server?.message} />
      <FormTextField control={control} name="name" label="Name" autoComplete="off" />
      <FormCheckboxGroup control={control} name="roles" label="Roles" choices={ROLE_CHOICES} />
      <div className="flex flex-wrap justify-end gap-3">
        <Button onPress={onClose}>Leave it</Button>
        <Button type="submit" kind="primary" isPending={change.isPending}>
          Keep the changes
        </Button>
      </div>
    </form>
  );
}
