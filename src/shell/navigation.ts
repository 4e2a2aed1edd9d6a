import type { Permissions } from "../../shared/roles.ts";

export interface Place {
  to: string;
  label: string;
}

/** The main places, as far as this person may go there. */
export function placesFor(permissions: Permissions): Place[] {
  return [
    { to: "/holdings", label: "Holdings" },
    ...(permissions.ask ? [{ to: "/ask", label: "Ask" }] : []),
    ...(permissions.readLedger ? [{ to: "/ledger", label: "Ledger" }] : []),
    ...(permissions.managePeople ? [{ to: "/people", label: "People" }] : []),
    { to: "/help", label: "Help" },
  ];
}
