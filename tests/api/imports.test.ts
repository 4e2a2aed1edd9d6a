import { readdir } from "node:fs/promises";
import { QueryTypes } from "sequelize";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { ImportView } from "../../shared/contracts/imports.ts";
import type { Survey } from "../../server/models/Survey.ts";
import { createPerson } from "../factories/people.ts";
import { createSurvey } from "../factories/surveys.ts";
import { BROKEN_FILES } from "../microdata/support/brokenFiles.ts";
import type { Client } from "../support/client.ts";
import { bringInRelease, csvFile, followImport, sendRelease } from "../support/releases.ts";
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

/** Everything an import could leave behind. */
async function traces(): Promise<unknown> {
  const tables = ["releases", "variables", "categories", "column_segments", "layouts"];
  const counts = [];
  for (const table of tables) {
    const [row] = await app.sequelize.query<{ rows: number }>(`SELECT COUNT(*) AS "rows" FROM ${table}`.replaceAll('"', "`"), {
      type: QueryTypes.SELECT,
    });
    counts.push([table, row?.rows]);
  }
  return { counts, uploads: await readdir(app.services.imports.uploadFolder) };
}

describe("a broken file leaves no trace", () => {
  it.each(BROKEN_FILES.map((broken) => [broken.name, broken] as const))("%s", async (_name, broken) => {
    const before = await traces();
    const view = await followImport(steward, (await sendRelease(steward, survey.id, broken)).id);
    expect(view).toMatchObject({ status: "failed", releaseId: null });
    expect(view.problems.map(({ kind }) => kind)).toContain(broken.kind);
    await expect.poll(traces).toEqual(before);
  });
});

describe("what must come with the files", () => {
  it("refuses a wave without a name and a form without microdata, keeping nothing", async () => {
    const before = await traces();
    const form = new FormData();
    form.set("wave", " ");
    const answer = await steward.upload(`/api/surveys/${survey.id}/releases`, form);
    expect(answer.status).toBe(400);
    expect(answer.body).toMatchObject({
      fields: { wave: expect.any(String) as string, microdata: expect.any(String) as string },
    });
    form.set("wave", "2025");
    form.append("microdata", csvFile("a\n1\n"));
    form.append("microdata", csvFile("a\n2\n"));
    expect((await steward.upload(`/api/surveys/${survey.id}/releases`, form)).status).toBe(400);
    expect(await traces()).toEqual(before);
  });

  it("refuses what isn't multipart, and a body cut off in the middle", async () => {
    const before = await traces();
    expect((await steward.post(`/api/surveys/${survey.id}/releases`, { wave: "2025" })).status).toBe(415);
    const cut = await steward.send("POST", `/api/surveys/${survey.id}/releases`, {
      headers: { "x-csrf-token": steward.csrfToken, "content-type": "multipart/form-data; boundary=b" },
      body: '--b\r\ncontent-disposition: form-data; name="microdata"; filename="m.csv"\r\n\r\na,b\r\n1',
    });
    expect(cut.status).toBe(400);
    expect(await traces()).toEqual(before);
  });
});

it("tells real progress and stops when cancelled, leaving no trace", async () => {
  const before = await traces();
  const rows = Array.from({ length: 400_000 }, (_, i) => `${i},${i % 7},${(i * 1.37).toFixed(3)},person ${i}`);
  const sent = await sendRelease(steward, survey.id, { microdata: `id,code,amount,name\n${rows.join("\n")}\n` });
  await expect
    .poll(async () => ImportView.parse((await steward.get(`/api/imports/${sent.id}`)).body).bytesDone, {
      timeout: 20_000,
      interval: 50,
    })
    .toBeGreaterThan(0);
  const cancelled = await steward.delete(`/api/imports/${sent.id}`);
  expect(cancelled.status).toBe(200);
  const view = await followImport(steward, sent.id);
  expect(view).toMatchObject({ status: "cancelled", releaseId: null, can: { cancel: false } });
  expect(view.bytesDone).toBeLessThan(view.bytesTotal);
  await expect.poll(traces).toEqual(before);
  expect((await steward.delete(`/api/imports/${sent.id}`)).status).toBe(409);
});

it("brings a release in with warnings told and its columns complete, then removes the draft without a trace", async () => {
  const before = await traces();
  const files = {
    microdata: "w,s,extra\n1.5,1,NA\n2,2,3.25\n0.5,,4\n",
    codebook: "variable,kind,code,missing\nw,numeric,,\ns,categorical,,\ns,,1,\ns,,2,\n",
  };
  const sent = await sendRelease(steward, survey.id, files);
  const view = await followImport(steward, sent.id);
  expect(view).toMatchObject({ status: "done", rows: 3 });
  expect(view.problems.map(({ kind, severity }) => [kind, severity])).toEqual([
    ["missing-word", "warning"],
    ["column-not-in-codebook", "warning"],
  ]);
  const codebook = await steward.get(`/api/releases/${view.releaseId}/codebook`);
  expect(codebook.body).toMatchObject({
    respondents: 3,
    variables: [
      { name: "w", kind: "numeric", minimum: 0.5, maximum: 2, missingShare: 0 },
      {
        name: "s",
        kind: "categorical",
        categories: [
          { code: "1", respondents: 1 },
          { code: "2", respondents: 1 },
        ],
        missingShare: 1 / 3,
      },
      { name: "extra", kind: "numeric", categories: [{ code: "NA", isMissing: true, respondents: 1 }], missingShare: 1 / 3 },
    ],
  });
  expect((await steward.delete(`/api/releases/${view.releaseId}`)).status).toBe(204);
  expect(await traces()).toEqual(before);
});

it("gives the codebook back as a file that can be brought in again", async () => {
  const microdata = "w,s\n1.5,1\n2,2\n";
  const codebook =
    'variable,label,kind,code,category label,missing\nw,Weight,numeric,,,\ns,"Smokes, daily",categorical,,,\ns,,,1,Yes,\ns,,,2,No,yes\n';
  const first = await bringInRelease(steward, survey.id, { microdata, codebook });
  const file = await steward.get(`/api/releases/${first}/codebook.csv`);
  const second = await bringInRelease(steward, survey.id, { microdata, codebook: file.text });
  const shape = async (id: string) => {
    const { body } = await steward.get(`/api/releases/${id}/codebook`);
    return JSON.stringify(body).replaceAll(/"(id|releaseId)":"[^"]+"/g, "");
  };
  expect(await shape(second)).toBe(await shape(first));
  const template = await steward.get("/api/codebook-template.csv");
  expect(template.text).toMatch(/^variable,label,kind,code,category label,missing\r\n/);
});
