import { randomUUID } from "node:crypto";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { createApp } from "../../server/app.ts";
import { OPERATIONS } from "../../server/openapi/operations.ts";
import { Grant } from "../../server/models/Grant.ts";
import { Import } from "../../server/models/Import.ts";
import { Variable } from "../../server/models/Variable.ts";
import { createPerson } from "../factories/people.ts";
import { createGrant, createSurvey } from "../factories/surveys.ts";
import type { Client } from "../support/client.ts";
import { bringInRelease } from "../support/releases.ts";
import { routesOf } from "../support/routesOf.ts";
import { startTestApp, type TestApp } from "../support/testApp.ts";
import { AUTHORISATION, READERS, ROLE_OF, type ReaderKind } from "./authorisationTable.ts";

let app: TestApp;
const clients = new Map<ReaderKind, Client>();
const ids = { survey: "", published: "", draft: "", import: "", grant: "", person: "", variable: "" };

beforeAll(async () => {
  app = await startTestApp();
  const people = new Map(
    await Promise.all(
      READERS.filter((kind) => kind !== "nobody").map(async (kind) => [kind, await createPerson([ROLE_OF[kind]])] as const),
    ),
  );
  const steward = people.get("itsSteward")!;
  const survey = await createSurvey([steward]);
  for (const kind of ["grantedEpidemiologist", "grantedPlanner"] as const) await createGrant(survey, people.get(kind)!, steward);
  const revoked = await createGrant(survey, people.get("revokedEpidemiologist")!, steward);
  await revoked.update({ revokedAt: new Date(), revokedBy: steward.id });
  for (const kind of READERS) {
    const client = app.client();
    const person = kind === "nobody" ? undefined : people.get(kind);
    if (person) await client.signIn(person.email);
    clients.set(kind, client);
  }
  const client = clients.get("itsSteward")!;
  const files = { microdata: `w,s\n${Array.from({ length: 40 }, (_, i) => `1,${i % 2}`).join("\n")}\n` };
  ids.survey = survey.id;
  ids.published = await bringInRelease(client, survey.id, files);
  await client.put(`/api/releases/${ids.published}/design`, {});
  await client.post(`/api/releases/${ids.published}/publication`);
  ids.draft = await bringInRelease(client, survey.id, { ...files, wave: "2027" });
  ids.import = (await Import.findOne())!.id;
  ids.grant = (await Grant.findOne())!.id;
  ids.person = (await createPerson(["planner"])).id;
  ids.variable = (await Variable.findOne({ where: { releaseId: ids.published } }))!.id;
});
afterAll(async () => app.close());

function addressOf(path: string, releaseId: string): string {
  const id = path.startsWith("/people")
    ? ids.person
    : path.startsWith("/imports")
      ? ids.import
      : path.startsWith("/grants")
        ? ids.grant
        : path.startsWith("/releases")
          ? releaseId
          : ids.survey;
  return `/api${path.replace(":id", id).replace(":variableId", ids.variable).replace(":token", "no-such-token")}`;
}

/**
 * Asks so that being let through changes nothing: what can be changed is sent without a body, which is refused as
 * unreadable only after the authorisation.
 */
async function knock(kind: ReaderKind, route: string, releaseId: string): Promise<"let through" | "kept out"> {
  const [method = "", path = ""] = route.split(" ");
  const client = clients.get(kind)!;
  const body = path.startsWith("/tables")
    ? {
        ...(path === "/tables" ? {} : { format: "csv" }),
        ...(path === "/tables" ? question(releaseId) : { question: question(releaseId) }),
      }
    : undefined;
  const answer = await client.send(method, addressOf(path, releaseId), {
    headers: { "x-csrf-token": client.csrfToken, ...(body ? { "content-type": "application/json" } : {}) },
    ...(body ? { body: JSON.stringify(body) } : {}),
  });
  const isKeptOut =
    answer.status === 401 || answer.status === 403 || (answer.status === 404 && answer.text.includes("or you may not see it"));
  return isKeptOut ? "kept out" : "let through";
}

const question = (releaseId: string) => ({ releaseId, outcome: { rule: { variable: "s", in: ["1"] } } });

/** What acts even without a body; walked for those kept out, and for the one let through only in its own test. */
const ACTS = new Set([
  "DELETE /session",
  "DELETE /grants/:id",
  "POST /people/:id/sign-in-link",
  "DELETE /releases/:id",
  "POST /releases/:id/publication",
]);
/** Before signing in a missing JSON body is refused as from a foreign page, whoever sends it. */
const BEFORE_SIGN_IN = new Set(["POST /session", "POST /sign-in-links/:token"]);

describe("every registered route lets through exactly whom the table says", () => {
  it("has a row for every route, and no row without one", () => {
    expect(Object.keys(AUTHORISATION).sort()).toEqual(routesOf(createApp(app.services)).sort());
  });

  it.each(Object.entries(AUTHORISATION))("%s", async (route, allowed) => {
    if (BEFORE_SIGN_IN.has(route)) return expect(allowed).toEqual(READERS);
    const wanted: Record<string, string> = {};
    const found: Record<string, string> = {};
    for (const kind of READERS) {
      const isAllowed = allowed.includes(kind);
      if (isAllowed && ACTS.has(route)) continue;
      wanted[kind] = isAllowed ? "let through" : "kept out";
      found[kind] = await knock(kind, route, ids.published);
    }
    expect(found).toEqual(wanted);
  });

  it.each(Object.keys(AUTHORISATION).filter((route) => route.includes("/releases/:id") || route.includes("/tables")))(
    "%s is the stewards' alone on a draft",
    async (route) => {
      for (const kind of READERS.filter((reader) => reader !== "itsSteward"))
        expect([kind, await knock(kind, route, ids.draft)]).toEqual([kind, "kept out"]);
    },
  );

  it("lets the survey's steward do what acts at once", async () => {
    const steward = clients.get("itsSteward")!;
    expect((await steward.delete(`/api/releases/${ids.draft}`)).status).toBe(204);
    expect((await steward.post(`/api/releases/${ids.published}/publication`)).status).toBe(409);
    const grant = await Grant.findOne({ where: { revokedAt: null } });
    expect((await steward.delete(`/api/grants/${grant?.id ?? ""}`)).status).toBe(200);
    expect((await clients.get("administrator")!.post(`/api/people/${ids.person}/sign-in-link`)).status).toBe(201);
    expect((await clients.get("planner")!.delete("/api/session")).status).toBe(204);
  });

  it("answers 404 for what doesn't exist as for what may not be seen", async () => {
    const client = clients.get("epidemiologist")!;
    const [absent, hidden] = [await client.get(`/api/surveys/${randomUUID()}`), await client.get(`/api/surveys/${ids.survey}`)];
    expect([absent.status, absent.text]).toEqual([hidden.status, hidden.text]);
  });
});

it("describes exactly the registered routes", async () => {
  const described = OPERATIONS.map(({ method, path }) => `${method.toUpperCase()} ${path}`);
  expect(described.sort()).toEqual(Object.keys(AUTHORISATION).sort());
  const { body } = await clients.get("nobody")!.get("/api/openapi.json");
  expect(Object.keys((body as { paths: object }).paths)).toContain("/tables");
});
