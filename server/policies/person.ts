import type { Policy } from "./policy.ts";

const isAdministrator = (reader: { roles: readonly string[] }) => reader.roles.includes("administrator");

/** People's accounts are the administrators' alone; nobody deactivates themselves. */
export const personPolicy = {
  read: isAdministrator,
  update: isAdministrator,
  deactivate: (reader, person) => isAdministrator(reader) && reader.id !== person.id,
} satisfies Policy<{ id: string }>;
