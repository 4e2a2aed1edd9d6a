import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { LedgerView } from "../../shared/contracts/ledger.ts";
import type { QuestionInput } from "../../shared/contracts/questions.ts";
import { ReadinessView } from "../../shared/contracts/readiness.ts";
import { Table, type Cell } from "../../shared/contracts/tables.ts";
import { createPerson } from "../factories/people.ts";
import { createGrant, createSurvey } from "../factories/surveys.ts";
import type { Client } from "../support/client.ts";
import { NHANES_CODEBOOK, NHANES_DESIGN, readNhanes } from "../support/nhanes.ts";
import { bringInRelease } from "../support/releases.ts";
import { startTestApp, type TestApp } from "../support/testApp.ts";

let app: TestApp;
let steward: Client;
let epidemiologist: Client;
let planner: Client;
let releaseId: string;

const HIGH = { rule: { variable: "HI_CHOL", in: ["1"] } };
const ADULTS = { variable: "agecat", in: ["2", "3", "4"] };

async function ask(who: Client, question: Omit<QuestionInput, "releaseId">): Promise<Table> {
  const answer = await who.post("/api/tables", { releaseId, ...question });
  expect(answer.status, answer.text).toBe(200);
  return Table.parse(answer.body);
}

function cellOf(table: Table, ...key: (string | null)[]): Extract<Cell, { shown: true }> {
  const cell = [table.whole, ...table.cells, ...table.margins].find((one) => one.key.join() === key.join());
  if (!cell?.shown) throw new Error(`The cell ${key.join()} isn't shown.`);
  return cell;
}

beforeAll(async () => {
  app = await startTestApp();
  const people = [
    await createPerson(["steward"]),
    await createPerson(["epidemiologist"]),
    await createPerson(["planner"]),
  ] as const;
  const survey = await createSurvey([people[0]]);
  await createGrant(survey, people[1], people[0]);
  await createGrant(survey, people[2], people[0]);
  [steward, epidemiologist, planner] = [app.client(), app.client(), app.client()];
  await steward.signIn(people[0].email);
  await epidemiologist.signIn(people[1].email);
  await planner.signIn(people[2].email);
  releaseId = await bringInRelease(steward, survey.id, {
    microdata: await readNhanes(),
    codebook: NHANES_CODEBOOK,
    wave: "2009–2010",
  });
});
afterAll(async () => app.close());

describe("NHANES 2009–2010 from upload to answers", () => {
  it("takes no question before it is published, and says why", async () => {
    const answer = await steward.post("/api/tables", { releaseId, outcome: HIGH });
    expect(answer.status).toBe(409);
    expect(answer.text).toContain("isn't published yet");
    expect((await epidemiologist.post("/api/tables", { releaseId, outcome: HIGH })).status).toBe(404);
  });

  // Source: R's survey package, ?nhanes; 8,591 rows, 31 PSUs in 15 strata.
  it("shows the design's numbers on its readiness and publishes", async () => {
    const design = await steward.put(`/api/releases/${releaseId}/design`, NHANES_DESIGN);
    expect(design.status, design.text).toBe(200);
    const readiness = ReadinessView.parse((await steward.get(`/api/releases/${releaseId}/readiness`)).body);
    expect(readiness).toMatchObject({
      respondents: 8591,
      strata: 15,
      psus: 31,
      degreesOfFreedom: 16,
      lonelyPsus: 0,
      can: { publish: true },
    });
    expect(readiness.findings.filter(({ severity }) => severity === "fault")).toEqual([]);
    expect(readiness.missing.find(({ variable }) => variable === "HI_CHOL")?.share).toBeCloseTo(745 / 8591, 10);
    expect((await steward.post(`/api/releases/${releaseId}/publication`)).status).toBe(200);
  });

  // Source: crude figures and NCHS decision steps computed with R's survey package (Parker et al. 2017 steps); see STANDARDS.
  it("gives the crude figures of adults, with Korn–Graubard limits", async () => {
    const table = await ask(epidemiologist, {
      outcome: HIGH,
      among: ADULTS,
      down: [{ variable: "RIAGENDR" }],
      comparison: { kind: "group", breakdown: "RIAGENDR", value: "1" },
    });
    const [whole, men, women] = [table.whole, cellOf(table, "1"), cellOf(table, "2")];
    if (!whole.shown) throw new Error("withheld");
    expect([whole.respondents, whole.affectedRespondents, whole.df]).toEqual([5696, 771, 16]);
    expect(whole.estimate).toBeCloseTo(0.136178, 6);
    expect(whole.se).toBeCloseTo(0.006573, 6);
    expect([whole.low, whole.high].map((limit) => limit?.toFixed(6))).toEqual(["0.122497", "0.150781"]);
    expect(men.estimate).toBeCloseTo(0.123291, 6);
    expect(women.low).toBeCloseTo(0.132841, 6);
    expect(women.high).toBeCloseTo(0.164731, 6);
    // Totals with the condition.
    expect(whole.affectedPeople).toBeCloseTo(28_218_434, -0.5);
    expect(whole.affectedPeopleSe).toBeCloseTo(2_022_446, -0.5);
    // Linear interval of the total: t on 16 degrees of freedom is 2.1199 (published t table).
    expect((whole.affectedPeopleHigh! - whole.affectedPeople!) / whole.affectedPeopleSe!).toBeCloseTo(2.1199, 4);
    // Odds of women over odds of men.
    expect(women.comparison?.oddsRatio).toBeCloseTo(0.148259 / (1 - 0.148259) / (0.123291 / (1 - 0.123291)), 4);
    // Women less men with the shared PSUs' covariance.
    expect(women.comparison?.difference).toBeCloseTo(0.0249675, 7);
    expect(women.comparison?.se).toBeCloseTo(0.00919, 5);
    expect(women.comparison?.low).toBeCloseTo(0.005488, 6);
    expect(women.comparison?.high).toBeCloseTo(0.044447, 6);
    expect(men.comparison).toBeUndefined();
  });

  it("adjusts the family of age groups after Holm and after Benjamini and Hochberg", async () => {
    const question = {
      outcome: HIGH,
      among: ADULTS,
      down: [{ variable: "race" }],
      comparison: { kind: "group" as const, breakdown: "race", value: "2" },
    };
    const raw = await ask(epidemiologist, question);
    expect(cellOf(raw, "3").comparison?.difference).toBeCloseTo(-0.041645, 6);
    expect(cellOf(raw, "3").comparison?.p).toBeCloseTo(0.00648, 4);
    const holm = await ask(epidemiologist, { ...question, adjustment: "holm" });
    expect(holm.familySize).toBe(3);
    expect(cellOf(holm, "3").comparison?.pAdjusted).toBeCloseTo(3 * 0.00648, 4);
  });

  it("marks the figures that the NCHS steps suppress, and doesn't send them to a planner", async () => {
    const question = { outcome: HIGH, among: ADULTS, down: [{ variable: "race" }], across: [{ variable: "RIAGENDR" }] };
    const table = await ask(epidemiologist, question);
    const otherWomen = cellOf(table, "4", "2");
    expect(otherWomen.respondents).toBe(164);
    expect(otherWomen.estimate).toBeCloseTo(0.111415, 6);
    expect(otherWomen.reliability.verdict).toBe("unreliable");
    expect(cellOf(table, "2", "2").reliability.verdict).not.toBe("unreliable");
    const forPlanner = await ask(planner, question);
    expect(forPlanner.cells.find(({ key }) => key.join() === "4,2")).toEqual({
      key: ["4", "2"],
      shown: false,
      reason: "unreliable",
    });
  });

  // Source: the domain trap, R's survey package: deleting other rows first gives .03499.
  it("estimates a subgroup as a domain of the whole sample", async () => {
    const table = await ask(epidemiologist, {
      outcome: HIGH,
      among: {
        all: [
          { variable: "race", in: ["4"] },
          { variable: "agecat", in: ["4"] },
        ],
      },
    });
    if (!table.whole.shown) throw new Error("withheld");
    expect([table.whole.respondents, table.whole.df]).toEqual([78, 6]);
    expect(table.whole.se).toBeCloseTo(0.05038, 5);
  });

  it("withholds a cell under the minimums so that no other figure gives it back", async () => {
    const table = await ask(epidemiologist, { outcome: HIGH, down: [{ variable: "agecat" }], across: [{ variable: "race" }] });
    const withheld = [...table.cells, ...table.margins].filter((cell) => !cell.shown);
    const young = withheld.filter(({ key }) => key[0] === "1");
    expect(young.some(({ reason }) => reason === "too-few")).toBe(true);
    // One withheld cell of a row and of a column would be the difference of the rest.
    for (const axis of [0, 1] as const) {
      for (const value of new Set(withheld.map(({ key }) => key[axis]))) {
        if (value === null || value === undefined) continue;
        const hidden = withheld.filter(({ key }) => key[axis] === value && !key.includes(null));
        const isMarginShown = table.margins.some((cell) => cell.shown && cell.key[axis] === value && cell.key[1 - axis] === null);
        if (hidden.length > 0 && isMarginShown) expect(hidden.length).toBeGreaterThan(1);
      }
    }
    for (const cell of withheld) expect(Object.keys(cell).sort()).toEqual(["key", "reason", "shown"]);
  });

  // Source: R's survey package, age-adjusted to the 2000 US standard population, three groups; published one-decimal values agree.
  it("standardises for age, with the covariance of both sides", async () => {
    const table = await ask(epidemiologist, {
      outcome: HIGH,
      down: [{ variable: "RIAGENDR" }],
      comparison: { kind: "group", breakdown: "RIAGENDR", value: "1" },
      standardise: { variable: "agecat", weights: { own: [0, 77_670, 72_816, 45_364] } },
    });
    expect(cellOf(table, "1").estimate).toBeCloseTo(0.121643, 6);
    expect(cellOf(table, "1").se).toBeCloseTo(0.008688, 6);
    expect(cellOf(table, "2").estimate).toBeCloseTo(0.143271, 6);
    expect(cellOf(table, "2").comparison?.se).toBeCloseTo(0.008536, 6);
    expect(cellOf(table, "2").comparison?.p).toBeCloseTo(0.0221, 4);
    expect(table.caption).toContain("Standardised for Age.");
  });

  // Source: R's survey package, Rao–Scott F of race among adults.
  it("tests the table as a whole", async () => {
    const table = await ask(epidemiologist, {
      outcome: HIGH,
      among: ADULTS,
      down: [{ variable: "race" }],
      overall: ["association"],
    });
    expect(table.overall[0]?.figures[0]?.estimate).toBeCloseTo(1.56272, 5);
    expect(table.overall[0]?.df).toBeCloseTo(27.32787, 4);
    expect(table.overall[0]?.p).toBeCloseTo(0.22836, 5);
  });

  it("refuses an adjustment that can't be told apart from the groups, and says why", async () => {
    const answer = await epidemiologist.post("/api/tables", {
      releaseId,
      outcome: { rule: { variable: "agecat", in: ["1"] } },
      down: [{ variable: "race" }],
      adjustFor: [{ variable: "agecat" }],
    });
    expect(answer.status, answer.text).toBe(422);
    expect(answer.text).not.toContain("fault is ours");
  });

  it("names what doesn't fit the codebook", async () => {
    const answer = await epidemiologist.post("/api/tables", { releaseId, outcome: HIGH, down: [{ variable: "height" }] });
    expect(answer.status).toBe(400);
    expect(answer.body).toMatchObject({ fields: { "down.0": expect.stringContaining("height") as string } });
  });

  it("leaves a ledger row for each question and each download, without any figure", async () => {
    const question = { releaseId, outcome: HIGH, down: [{ variable: "agecat" }] };
    await ask(epidemiologist, question);
    expect((await epidemiologist.post("/api/tables/downloads", { question, format: "csv" })).status).toBe(204);
    const { entries } = LedgerView.parse((await steward.get("/api/ledger")).body);
    expect(entries.slice(0, 2)).toMatchObject([
      { action: "table.downloaded", summary: expect.stringContaining("Took away as csv") as string },
      { action: "question.asked", summary: expect.stringContaining("Total cholesterol of 240 mg/dL or more: Yes") as string },
    ]);
  });
});
