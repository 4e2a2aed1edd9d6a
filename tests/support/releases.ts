import { expect } from "vitest";
import { ImportView } from "../../shared/contracts/imports.ts";
import type { Client } from "./client.ts";

export const csvFile = (text: string | Uint8Array, name = "microdata.csv") =>
  new File([typeof text === "string" ? text : Uint8Array.from(text)], name, { type: "text/csv" });

/** Sends files as a steward's browser would; the import goes on afterwards. */
export async function sendRelease(
  steward: Client,
  surveyId: string,
  files: { microdata: string | Uint8Array; codebook?: string | Uint8Array; wave?: string },
): Promise<ImportView> {
  const form = new FormData();
  form.set("wave", files.wave ?? "2025");
  form.set("microdata", csvFile(files.microdata));
  if (files.codebook !== undefined) form.set("codebook", csvFile(files.codebook, "codebook.csv"));
  const answer = await steward.upload(`/api/surveys/${surveyId}/releases`, form);
  expect(answer.status, answer.text).toBe(202);
  return ImportView.parse(answer.body);
}

/** Follows an import to its end. */
export async function followImport(steward: Client, importId: string): Promise<ImportView> {
  for (;;) {
    const view = ImportView.parse((await steward.get(`/api/imports/${importId}`)).body);
    if (view.status !== "queued" && view.status !== "running") return view;
    await new Promise((resolve) => setTimeout(resolve, 50));
  }
}

/** Brings a release in and waits; fails the test when it is refused. */
export async function bringInRelease(
  steward: Client,
  surveyId: string,
  files: Parameters<typeof sendRelease>[2],
): Promise<string> {
  const view = await followImport(steward, (await sendRelease(steward, surveyId, files)).id);
  expect(view.status, JSON.stringify(view.problems)).toBe("done");
  return view.releaseId ?? "";
}
