import { zodResolver } from "@hookform/resolvers/zod";
import { useForm } from "react-hook-form";
import type { z } from "zod";
import { PersonInput, type NewSignInLink } from "../../../shared/contracts/people.ts";
import { Button } from "../../components/Button.tsx";
import { Dialog } from "../../components/Dialog.tsx";
import { FormCheckboxGroup, FormError, FormTextField } from "../../components/formFields.tsx";
import { showServerErrors } from "../../lib/form.ts";
import { useAddPerson } from "./queries.ts";
import { ROLE_CHOICES } from "./roleChoices.tsx";

/** Asks for name, e-mail and roles; the answer is a link to hand over. */
export function AddPersonDialog({
  isOpen,
  onClose,
  onAdded,
}: {
  isOpen: boolean;
  onClose: () => void;
  onAdded: (made: z.infer<typeof NewSignInLink>) => void;
}) {
  return (
    <Dialog title="Add a person" isOpen={isOpen} onClose={onClose}>
      <AddPersonForm onClose={onClose} onAdded={onAdded} />
    </Dialog>
  );
}

function AddPersonForm({ onClose, onAdded }: { onClose: () => void; onAdded: (made: z.infer<typeof NewSignInLink>) => void }) {
  const add = useAddPerson();
  const { control, handleSubmit, setError, formState } = useForm({
    resolver: zodResolver(PersonInput),
    defaultValues: { name: "", email: "", roles: [] },
  });
  const submit = handleSubmit((input) =>
    add.mutate(input, {
      onSuccess: (made) => {
        onAdded(made);
        onClose();
      },
      onError: (error) => showServerErrors(error, setError, ["name", "email", "roles"]),
    }),
  );
  return (
    <form noValidate onSubmit={submit} className="space-y-5">
      <FormError message={formState.errors.root?.server?.message} />
      <FormTextField control={control} name="name" label="Name" autoComplete="off" autoFocus />
      <FormTextField control={control} name="email" label="E-mail" type="email" autoComplete="off" />
      <FormCheckboxGroup control={control} name="roles" label="Roles" choices={ROLE_CHOICES} />
      <div className="flex flex-wrap justify-end gap-3">
        <Button onPress={onClose}>Leave it</Button>
        <Button type="submit" kind="primary" isPending={add.isPending}>
          Add and make a link
        </Button>
      </div>
    </form>
  );
}
