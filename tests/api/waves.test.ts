import { afterAll, beforeAll, expect, it } from "vitest";
import { Table } from "../../shared/contracts/tables.ts";
import { createPerson } from "../factories/people.ts";
import { createSurvey } from "../factories/surveys.ts";
import type { Client } from "../support/client.ts";
import { bringInRelease } from "../support/releases.ts";
import { startTestApp, type TestApp } from "../support/testApp.ts";

let app: TestApp;
let steward: Client;
beforeAll(async () => {
  app = await startTestApp();
  steward = app.client();
});
afterAll(async () => app.close());

/** Two strata of many PSUs; in each group `share` of every ten are affected. */
function wave(shares: readonly number[], codes = "1,2"): { microdata: string; codebook: string } {
  const rows = Array.from({ length: 800 }, (_, i) => {
    const group = i % 2;
    const affected = (Math.floor(i / 2) * 7) % 10 < shares[group]! ? 1 : 0;
    return `${1 + (i % 3) / 2},${i % 4 < 2 ? "A" : "B"},${Math.floor(i / 20)},${group + 1},${affected}`;
  });
  const groups = codes.split(",").map((code) => `g,,,${code},,`);
  return {
    microdata: `w,h,i,g,y\n${rows.join("\n")}\n`,
    codebook: [
      "variable,label,kind,code,category label,missing",
      "w,,numeric,,,",
      "h,,text,,,",
      "i,,numeric,,,",
      "g,,categorical,,,",
      ...groups,
      "y,,categorical,,,",
      "y,,,0,,",
      "y,,,1,,",
      "",
    ].join("\n"),
  };
}

it("sets each group against itself in another wave, with the variances of two independent samples", async () => {
  const person = await createPerson(["steward"]);
  const survey = await createSurvey([person]);
  await steward.signIn(person.email);
  const publish = async (name: string, files: ReturnType<typeof wave>) => {
    const id = await bringInRelease(steward, survey.id, { ...files, wave: name });
    await steward.put(`/api/releases/${id}/design`, { weight: "w", strata: "h", psu: "i" });
    expect((await steward.post(`/api/releases/${id}/publication`)).status).toBe(200);
    return id;
  };
  const [first, second] = [await publish("2021", wave([3, 5])), await publish("2023", wave([3, 7]))];
  const question = { outcome: { rule: { variable: "y", in: ["1"] } }, down: [{ variable: "g" }] };
  const ask = async (releaseId: string, more: object = {}) => {
    const answer = await steward.post("/api/tables", { releaseId, ...question, ...more });
    expect(answer.status, answer.text).toBe(200);
    return Table.parse(answer.body);
  };
  const [before, after] = [await ask(first), await ask(second)];
  const change = await ask(second, { comparison: { kind: "release", releaseId: first } });
  expect(change.caption).toContain("Compared with the same in 2021.");
  expect(change.release.designDf).toBe(after.release.designDf);
  for (const i of [0, 1]) {
    const [a, b, c] = [before.cells[i]!, after.cells[i]!, change.cells[i]!];
    if (!a.shown || !b.shown || !c.shown) throw new Error("withheld");
    expect(c.estimate).toBeCloseTo(b.estimate!, 12);
    expect(c.se).toBeCloseTo(b.se!, 12);
    expect(c.comparison?.reference).toBeCloseTo(a.estimate!, 12);
    expect(c.comparison?.difference).toBeCloseTo(b.estimate! - a.estimate!, 12);
    // Disjoint strata: no covariance between the waves.
    expect(c.comparison?.se).toBeCloseTo(Math.hypot(a.se!, b.se!), 12);
    expect(c.comparison?.df).toBe(a.df + b.df);
  }

  const itself = await steward.post("/api/tables", {
    releaseId: first,
    ...question,
    comparison: { kind: "release", releaseId: first },
  });
  expect(itself.status).toBe(400);
  const stranger = await createSurvey([person]);
  const foreignId = await bringInRelease(steward, stranger.id, wave([1, 2]));
  expect(
    (await steward.post("/api/tables", { releaseId: first, ...question, comparison: { kind: "release", releaseId: foreignId } }))
      .status,
  ).toBe(409);
  const otherCodes = await publish("2025", { ...wave([3, 5], "1,2,3") });
  const refused = await steward.post("/api/tables", {
    releaseId: first,
    ...question,
    comparison: { kind: "release", releaseId: otherCodes },
  });
  expect(refused).toMatchObject({ status: 400, body: { fields: { comparison: expect.stringContaining("2025") as string } } });
});
