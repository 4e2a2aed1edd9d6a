import { useQuery } from "@tanstack/react-query";
import { useState } from "react";
import type { NewSignInLink, PersonView } from "../../../shared/contracts/people.ts";
import type { z } from "zod";
import { formatDateTime } from "../../../shared/format.ts";
import { ROLE_LABELS } from "../../../shared/roles.ts";
import { Button } from "../../components/Button.tsx";
import { DataTable } from "../../components/DataTable.tsx";
import { Page } from "../../components/Page.tsx";
import { PageError } from "../../components/PageError.tsx";
import { PageLoading } from "../../components/PageLoading.tsx";
import { columnsFor } from "../../components/tableFeatures.ts";
import { AddPersonDialog } from "./AddPersonDialog.tsx";
import { NewLink } from "./NewLink.tsx";
import { PersonMenu } from "./PersonMenu.tsx";
import { peopleQuery } from "./queries.ts";

const column = columnsFor<PersonView>();

function stateOf(person: PersonView): string {
  if (!person.isActive) return "Deactivated";
  return person.hasPassword ? "Active" : "Invited, not signed in yet";
}

/** Accounts: who there is, what they may be, and a way in for those who have none. */
export function PeoplePage() {
  const people = useQuery(peopleQuery);
  const [isAdding, setIsAdding] = useState(false);
  const [made, setMade] = useState<z.infer<typeof NewSignInLink> | null>(null);
  if (people.isPending) return <PageLoading what="people" />;
  if (people.isError) return <PageError error={people.error} onRetry={people.refetch} />;
  const columns = column.columns([
    column.accessor("name", {
      header: "Name",
      cell: ({ row }) => (
        <>
          <span className="block min-w-52 font-medium">{row.original.name}</span>
          <span className="block wrap-anywhere text-muted">{row.original.email}</span>
        </>
      ),
    }),
    column.accessor((person) => person.roles.map((role) => ROLE_LABELS[role]).join(", "), { id: "roles", header: "Roles" }),
    column.accessor(stateOf, { id: "state", header: "State" }),
    column.accessor((person) => person.lastSignInAt ?? "", {
      id: "lastSignIn",
      header: "Last sign-in",
      cell: ({ row }) => (row.original.lastSignInAt ? formatDateTime(row.original.lastSignInAt) : "Never"),
    }),
    column.display({
      id: "acts",
      header: () => <span className="sr-only">Acts</span>,
      cell: ({ row }) => <PersonMenu person={row.original} onLink={setMade} />,
    }),
  ]);
  return (
    <Page
      title="People"
      lead="Everyone with an account. Access to a survey is not given here: its stewards give it on the survey's Access page."
      actions={
        <Button kind="primary" onPress={() => setIsAdding(true)}>
          Add a person
        </Button>
      }
    >
      {made && <NewLink made={made} onDone={() => setMade(null)} />}
      <DataTable
        caption="People"
        columns={columns}
        rows={people.data.people}
        rowKey={({ id }) => id}
        initialSort={[{ id: "name", desc: false }]}
      />
      <AddPersonDialog isOpen={isAdding} onClose={() => setIsAdding(false)} onAdded={setMade} />
    </Page>
  );
}
