import type { Role } from "../../shared/roles.ts";

/** Who asks: nobody, each role without any tie to the survey, and those tied to it. */
export const READERS = [
  "nobody",
  "steward",
  "epidemiologist",
  "planner",
  "administrator",
  "itsSteward",
  "grantedEpidemiologist",
  "grantedPlanner",
  "revokedEpidemiologist",
] as const;
export type ReaderKind = (typeof READERS)[number];

export const ROLE_OF: Record<Exclude<ReaderKind, "nobody">, Role> = {
  steward: "steward",
  epidemiologist: "epidemiologist",
  planner: "planner",
  administrator: "administrator",
  itsSteward: "steward",
  grantedEpidemiologist: "epidemiologist",
  grantedPlanner: "planner",
  revokedEpidemiologist: "epidemiologist",
};

const everyone = READERS;
const signedIn = READERS.filter((reader) => reader !== "nobody");
const stewards = ["steward", "itsSteward"] as const;
const administrator = ["administrator"] as const;
const itsSteward = ["itsSteward"] as const;
const mayRead = ["itsSteward", "grantedEpidemiologist", "grantedPlanner"] as const;

/**
 * Who is let through to each route, `METHOD /path` as Express spells it. `:id` is a survey with a published release, that
 * release, an import, a grant or a person, as the path says; `draft` routes are walked on a draft release too.
 */
export const AUTHORISATION: Record<string, readonly ReaderKind[]> = {
  "GET /health": everyone,
  "GET /openapi.json": everyone,
  "GET /session": everyone,
  "POST /session": everyone,
  "DELETE /session": signedIn,
  "GET /sign-in-links/:token": everyone,
  "POST /sign-in-links/:token": everyone,
  "PUT /account/password": signedIn,
  "GET /people": administrator,
  "POST /people": administrator,
  "PATCH /people/:id": administrator,
  "POST /people/:id/sign-in-link": administrator,
  "GET /surveys": signedIn,
  "POST /surveys": stewards,
  "GET /surveys/:id": mayRead,
  "PATCH /surveys/:id": itsSteward,
  "PUT /surveys/:id/stewards": itsSteward,
  "GET /surveys/:id/candidates": itsSteward,
  "GET /surveys/:id/grants": itsSteward,
  "POST /surveys/:id/grants": itsSteward,
  "DELETE /grants/:id": itsSteward,
  "POST /surveys/:id/releases": itsSteward,
  "GET /surveys/:id/imports": itsSteward,
  "GET /imports/:id": itsSteward,
  "DELETE /imports/:id": itsSteward,
  "GET /codebook-template.csv": signedIn,
  "GET /releases/:id": mayRead,
  "DELETE /releases/:id": itsSteward,
  "GET /releases/:id/codebook": mayRead,
  "GET /releases/:id/codebook.csv": mayRead,
  "PATCH /releases/:id/codebook/:variableId": itsSteward,
  "GET /releases/:id/design": itsSteward,
  "PUT /releases/:id/design": itsSteward,
  "GET /releases/:id/readiness": itsSteward,
  "POST /releases/:id/publication": itsSteward,
  "POST /tables": mayRead,
  "POST /tables/downloads": mayRead,
  "POST /tables/script": mayRead,
  "GET /ledger": signedIn,
  "GET /ledger.csv": signedIn,
};
