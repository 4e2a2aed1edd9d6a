import { afterAll, beforeAll, beforeEach, describe, expect, it } from "vitest";
import { GrantsView } from "../../shared/contracts/access.ts";
import { LedgerView } from "../../shared/contracts/ledger.ts";
import { LedgerEntry } from "../../server/models/LedgerEntry.ts";
import type { Person } from "../../server/models/Person.ts";
import { Survey } from "../../server/models/Survey.ts";
import { createPerson } from "../factories/people.ts";
import { createGrant, createSurvey } from "../factories/surveys.ts";
import type { Client } from "../support/client.ts";
import { startTestApp, type TestApp } from "../support/testApp.ts";

let app: TestApp;
beforeAll(async () => {
  app = await startTestApp();
});
afterAll(async () => app.close());

let steward: Person;
let reader: Person;
let survey: Survey;
let stewardClient: Client;
let readerClient: Client;

beforeEach(async () => {
  [steward, reader] = [await createPerson(["steward"]), await createPerson(["epidemiologist"])];
  survey = await createSurvey([steward]);
  [stewardClient, readerClient] = [app.client(), app.client()];
  await stewardClient.signIn(steward.email);
  await readerClient.signIn(reader.email);
});

const day = (days: number) => new Date(Date.now() + days * 86_400_000).toISOString().slice(0, 10);
const give = (values: Partial<{ personId: string; purpose: string; endsOn: string }> = {}) =>
  stewardClient.post(`/api/surveys/${survey.id}/grants`, {
    personId: reader.id,
    purpose: "Yearly report",
    endsOn: day(30),
    ...values,
  });
const statusForReader = async () => (await readerClient.get(`/api/surveys/${survey.id}`)).status;

describe("a grant", () => {
  it("opens the survey until it is taken back, with effect on the very next request", async () => {
    expect(await statusForReader()).toBe(404);
    const given = await give();
    expect(given).toMatchObject({
      status: 201,
      body: { status: "active", purpose: "Yearly report", givenBy: steward.name, can: { revoke: true } },
    });
    expect(await statusForReader()).toBe(200);
    const { grants } = GrantsView.parse((await stewardClient.get(`/api/surveys/${survey.id}/grants`)).body);
    expect((await stewardClient.delete(`/api/grants/${grants[0]?.id ?? ""}`)).body).toMatchObject({
      status: "revoked",
      revokedBy: steward.name,
    });
    expect(await statusForReader()).toBe(404);
    expect((await readerClient.get("/api/surveys")).body).toEqual({ surveys: [] });
    expect((await stewardClient.delete(`/api/grants/${grants[0]?.id ?? ""}`)).status).toBe(409);
  });

  it("holds to the end of its last day and not a day longer", async () => {
    await createGrant(survey, reader, steward, day(0));
    expect(await statusForReader()).toBe(200);
    const other = await createSurvey([steward]);
    await createGrant(other, reader, steward, day(-1));
    expect((await readerClient.get(`/api/surveys/${other.id}`)).status).toBe(404);
  });

  it("needs a person who may ask, a purpose, and a day that isn't past", async () => {
    expect(await give({ endsOn: day(-1) })).toMatchObject({
      status: 400,
      body: { fields: { endsOn: expect.any(String) as string } },
    });
    expect(await give({ purpose: "  " })).toMatchObject({
      status: 400,
      body: { fields: { purpose: expect.any(String) as string } },
    });
    const gone = await createPerson(["planner"], { isActive: false });
    expect(await give({ personId: gone.id })).toMatchObject({
      status: 400,
      body: { fields: { personId: expect.any(String) as string } },
    });
    expect(GrantsView.parse((await stewardClient.get(`/api/surveys/${survey.id}/grants`)).body).grants).toEqual([]);
  });

  it("is one at a time for each person and survey", async () => {
    await give();
    expect((await give()).status).toBe(409);
  });

  it("is given only by the survey's own stewards", async () => {
    const other = app.client();
    await other.signIn((await createPerson(["steward"])).email);
    expect((await other.get(`/api/surveys/${survey.id}/grants`)).status).toBe(404);
    expect(
      (await other.post(`/api/surveys/${survey.id}/grants`, { personId: reader.id, purpose: "Mine", endsOn: day(30) })).status,
    ).toBe(404);
    await createGrant(survey, reader, steward);
    expect(
      (await readerClient.post(`/api/surveys/${survey.id}/grants`, { personId: reader.id, purpose: "Mine", endsOn: day(30) }))
        .status,
    ).toBe(403);
  });
});

describe("stewards", () => {
  it("hand a survey over to other data stewards, never to nobody", async () => {
    const next = await createPerson(["steward"]);
    expect((await stewardClient.put(`/api/surveys/${survey.id}/stewards`, { personIds: [] })).status).toBe(400);
    expect((await stewardClient.put(`/api/surveys/${survey.id}/stewards`, { personIds: [reader.id] })).status).toBe(400);
    expect((await stewardClient.put(`/api/surveys/${survey.id}/stewards`, { personIds: [next.id] })).status).toBe(204);
    expect((await stewardClient.get(`/api/surveys/${survey.id}`)).status).toBe(404);
  });
});

describe("the ledger", () => {
  it("holds a row for every act, each where its readers may see it", async () => {
    await give();
    await readerClient.patch(`/api/surveys/${survey.id}`, { title: "Mine now" });
    const actions = async (who: Client, query = "") =>
      LedgerView.parse((await who.get(`/api/ledger${query}`)).body).entries.map(({ action }) => action);
    expect(await actions(stewardClient, `?survey=${survey.id}`)).toEqual(["grant.given"]);
    expect(await actions(readerClient)).toEqual(["access.refused", "session.started"]);
    const administrator = app.client();
    await administrator.signIn((await createPerson(["administrator"])).email);
    expect(await actions(administrator, "?action=access.refused")).toContain("access.refused");
    expect((await administrator.get("/api/ledger?action=nothing.known")).status).toBe(400);
  });

  it("stands together with its act: where one fails, neither is kept", async () => {
    const before = await LedgerEntry.count();
    const title = survey.title;
    await app.sequelize.query("RENAME TABLE ledger TO ledger_away");
    try {
      expect((await stewardClient.patch(`/api/surveys/${survey.id}`, { title: "Unrecorded" })).status).toBe(500);
    } finally {
      await app.sequelize.query("RENAME TABLE ledger_away TO ledger");
    }
    expect((await Survey.findByPk(survey.id))?.title).toBe(title);
    expect(await LedgerEntry.count()).toBe(before);
  });

  it("downloads as CSV that no spreadsheet runs", async () => {
    await stewardClient.patch(`/api/surveys/${survey.id}`, { title: "=HYPERLINK(1)", description: "" });
    const file = await stewardClient.get("/api/ledger.csv");
    expect(file.headers.get("content-type")).toContain("text/csv");
    expect(file.text).toContain(",'=HYPERLINK(1),");
    expect(file.text).not.toMatch(/(^|,)=/m);
  });
});
