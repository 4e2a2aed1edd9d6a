import { ROLE_LABELS, ROLES, type Role } from "../../../shared/roles.ts";

const MEANINGS: Record<Role, string> = {
  steward: "brings in releases, declares designs, decides who may use a survey",
  epidemiologist: "asks, slices and compares; sees figures that need care",
  planner: "asks and chooses where a campaign goes; sees only figures that can be relied on",
  administrator: "keeps accounts; sees no survey by that",
};

/** The roles with what each may do. */
export const ROLE_CHOICES = ROLES.map((role) => ({
  value: role,
  label: (
    <>
      {ROLE_LABELS[role]}
      <span className="block text-sm text-muted">{MEANINGS[role]}</span>
    </>
  ),
}));
