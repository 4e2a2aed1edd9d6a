import { afterAll, beforeAll, beforeEach, describe, expect, it } from "vitest";
import { ReadinessView } from "../../shared/contracts/readiness.ts";
import type { DesignInput } from "../../shared/contracts/design.ts";
import type { Survey } from "../../server/models/Survey.ts";
import { createPerson } from "../factories/people.ts";
import { createSurvey } from "../factories/surveys.ts";
import type { Client } from "../support/client.ts";
import { bringInRelease } from "../support/releases.ts";
import { startTestApp, type TestApp } from "../support/testApp.ts";

let app: TestApp;
let steward: Client;
let survey: Survey;

beforeAll(async () => {
  app = await startTestApp();
  const person = await createPerson(["steward"]);
  survey = await createSurvey([person]);
  steward = app.client();
  await steward.signIn(person.email);
});
afterAll(async () => app.close());

const CODEBOOK = "variable,kind,code,missing\nw,numeric,,\nh,text,,\ni,text,,\ny,categorical,,\ny,,0,\ny,,1,\n";
const HEADER = "w,h,i,y";
/** Two strata of two PSUs. */
const SOUND = ["1,A,1,0", "2,A,2,1", "1.5,B,1,0", "2.5,B,2,1"];

const bringIn = (rows: readonly string[], codebook = CODEBOOK, header = HEADER) =>
  bringInRelease(steward, survey.id, { microdata: `${header}\n${rows.join("\n")}\n`, codebook });

const DESIGN: DesignInput = { weight: "w", strata: "h", psu: "i" };
async function declare(releaseId: string, design: DesignInput = DESIGN) {
  return steward.put(`/api/releases/${releaseId}/design`, design);
}
async function readinessOf(releaseId: string) {
  return ReadinessView.parse((await steward.get(`/api/releases/${releaseId}/readiness`)).body);
}

describe("faults that make estimates wrong block publication and say how to mend them", () => {
  const cases: { name: string; rows: string[]; design?: DesignInput; kind: string; count: number | null }[] = [
    { name: "a weight is missing", rows: [...SOUND, ",B,2,1"], kind: "weight-missing", count: 1 },
    { name: "a weight is negative", rows: [...SOUND, "-1,B,2,1"], kind: "weight-negative", count: 1 },
    { name: "all weights are zero", rows: SOUND.map((row) => row.replace(/^[\d.]+/, "0")), kind: "weights-all-zero", count: 4 },
    {
      name: "a PSU is in two strata though labels are declared unique",
      rows: SOUND,
      design: { ...DESIGN, psuLabelsAreUnique: true },
      kind: "psu-in-two-strata",
      count: 2,
    },
    { name: "every stratum has a single PSU", rows: ["1,A,1,0", "2,A,1,1", "1,B,1,0"], kind: "all-lonely", count: 2 },
    {
      name: "a lonely PSU where the design refuses them",
      rows: [...SOUND, "1,C,1,0"],
      design: { ...DESIGN, lonely: "refuse" },
      kind: "lonely-refused",
      count: 1,
    },
    { name: "a respondent has no stratum", rows: [...SOUND, "1,,1,0"], kind: "stratum-missing", count: 1 },
    { name: "a respondent has no PSU", rows: [...SOUND, "1,A,,0"], kind: "PSU-missing", count: 1 },
    {
      name: "a population is smaller than its sample",
      rows: SOUND,
      design: { ...DESIGN, populationSize: "w" },
      kind: "population-size-small",
      count: 2,
    },
    {
      name: "a population size differs within its stratum",
      rows: SOUND,
      design: { ...DESIGN, populationSize: "w" },
      kind: "population-size-varies",
      count: 2,
    },
  ];
  it.each(cases)("$name", async ({ rows, design, kind, count }) => {
    const id = await bringIn(rows);
    expect((await declare(id, design)).status).toBe(200);
    const readiness = await readinessOf(id);
    const finding = readiness.findings.find((found) => found.kind === kind);
    expect(finding, JSON.stringify(readiness.findings)).toMatchObject({
      severity: "fault",
      count,
      remedy: expect.stringMatching(/\.$/) as string,
    });
    expect(readiness.can.publish).toBe(false);
    const refused = await steward.post(`/api/releases/${id}/publication`);
    expect(refused.status).toBe(409);
    expect(refused.text).toContain("Nothing was changed.");
    expect((await steward.get(`/api/releases/${id}`)).body).toMatchObject({ status: "draft", publishedAt: null });
  });

  it("no design is declared", async () => {
    const id = await bringIn(SOUND);
    expect((await readinessOf(id)).findings).toMatchObject([{ kind: "no-design", severity: "fault" }]);
    expect((await steward.post(`/api/releases/${id}/publication`)).status).toBe(409);
  });
});

describe("readiness", () => {
  it("shows the design's numbers and the spread of the weights", async () => {
    const id = await bringIn([...SOUND, "0,B,2,1", "1,C,1,"]);
    await declare(id);
    const readiness = await readinessOf(id);
    expect(readiness).toMatchObject({ respondents: 6, sumOfWeights: 8, strata: 3, psus: 5, degreesOfFreedom: 2, lonelyPsus: 1 });
    // Positive weights 1, 1, 1.5, 2, 2.5: n Σw² / (Σw)² = 5 · 14.5 / 64 (Kish 1965).
    expect(readiness.weight).toMatchObject({ minimum: 0, median: 1.5, maximum: 2.5, zero: 1 });
    expect(readiness.weight?.kishEffect).toBeCloseTo((5 * 14.5) / 64, 12);
    expect(readiness.weight?.histogram.reduce((sum, bin) => sum + bin.respondents, 0)).toBe(6);
    expect(readiness.findings.map(({ kind }) => kind)).toEqual(expect.arrayContaining(["lonely", "weight-zero", "few-degrees"]));
    expect(readiness.missing[0]).toMatchObject({ variable: "y", share: 1 / 6 });
    expect(readiness.can.publish).toBe(true);
  });

  it("counts each respondent as a PSU, in one stratum, where the design names none", async () => {
    const id = await bringIn(SOUND);
    await declare(id, {});
    expect(await readinessOf(id)).toMatchObject({ strata: 1, psus: 4, degreesOfFreedom: 3, weight: null, sumOfWeights: 4 });
  });
});

describe("a design", () => {
  let id: string;
  beforeEach(async () => {
    id = await bringIn(SOUND);
  });

  it("names each field that doesn't fit, and stays as it was", async () => {
    await declare(id);
    const refused = await declare(id, {
      weight: "h",
      strata: "region",
      minimums: { respondents: 2, affected: 3, unaffected: 3 },
      replicates: { pattern: "repwt1–repwt80", method: "JKn" },
    });
    expect(refused.status).toBe(400);
    expect(refused.body).toMatchObject({
      fields: {
        weight: expect.stringContaining("text") as string,
        strata: expect.stringContaining("region") as string,
        "minimums.respondents": expect.stringContaining("5") as string,
        "replicates.pattern": expect.any(String) as string,
        "replicates.replicateScales": expect.any(String) as string,
      },
    });
    expect((await steward.get(`/api/releases/${id}/design`)).body).toMatchObject({
      design: { weight: "w", strata: "h", psu: "i", lonely: "centred" },
    });
  });

  it("can't be changed once the release is published, nor can its codebook; a second publication is refused", async () => {
    await declare(id);
    expect((await steward.post(`/api/releases/${id}/publication`)).status).toBe(200);
    expect((await declare(id, { weight: null })).status).toBe(409);
    const codebook = (await steward.get(`/api/releases/${id}/codebook`)).body as { variables: { id: string }[] };
    expect((await steward.patch(`/api/releases/${id}/codebook/${codebook.variables[3]!.id}`, { label: "New" })).status).toBe(409);
    expect((await steward.post(`/api/releases/${id}/publication`)).status).toBe(409);
    expect((await steward.delete(`/api/releases/${id}`)).status).toBe(409);
  });

  it("of a corrected release makes the one published before superseded", async () => {
    await declare(id);
    await steward.post(`/api/releases/${id}/publication`);
    const corrected = await bringIn(SOUND);
    await declare(corrected);
    expect((await steward.post(`/api/releases/${corrected}/publication`)).status).toBe(200);
    expect((await steward.get(`/api/releases/${id}`)).body).toMatchObject({ status: "superseded", can: { ask: false } });
    expect((await steward.post("/api/tables", { releaseId: id, outcome: { variable: "w" } })).status).toBe(409);
  });
});

describe("a draft's codebook", () => {
  it("takes labels, kinds and missing codes; a code of the design that turns missing shows on the readiness", async () => {
    const id = await bringIn(["1,1,1,0", "2,1,2,1", "9,2,1,0", "2,2,2,1"], CODEBOOK.replace("h,text", "h,numeric"));
    await declare(id);
    expect((await readinessOf(id)).findings.map(({ kind }) => kind)).not.toContain("weight-missing");
    const { variables } = (await steward.get(`/api/releases/${id}/codebook`)).body as {
      variables: { id: string; name: string }[];
    };
    const idOf = (name: string) => variables.find((variable) => variable.name === name)?.id ?? "";
    const weight = await steward.patch(`/api/releases/${id}/codebook/${idOf("w")}`, {
      label: "Weight",
      categories: [{ code: "9", label: "Unknown", isMissing: true }],
    });
    expect(weight.body).toMatchObject({
      label: "Weight",
      missingShare: 1 / 4,
      categories: [{ code: "9", label: "Unknown", isMissing: true, respondents: 1 }],
    });
    expect((await readinessOf(id)).findings).toContainEqual(expect.objectContaining({ kind: "weight-missing", count: 1 }));
    const refused = await steward.patch(`/api/releases/${id}/codebook/${idOf("y")}`, {
      categories: [{ code: "7", label: "?", isMissing: true }],
    });
    expect(refused).toMatchObject({ status: 400, body: { fields: { categories: expect.stringContaining("7") as string } } });
    expect((await steward.patch(`/api/releases/${id}/codebook/${idOf("i")}`, { kind: "numeric" })).status).toBe(400);
    expect((await steward.patch(`/api/releases/${id}/codebook/${idOf("y")}`, { kind: "numeric" })).body).toMatchObject({
      kind: "numeric",
    });
  });
});
