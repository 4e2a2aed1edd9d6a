import { strFromU8, unzipSync } from "fflate";
import { expect, it } from "vitest";
import { Question } from "../../../shared/contracts/questions.ts";
import { tableBundle } from "../../../src/features/questions/bundle.ts";
import { askOf, tableOf } from "./askFixtures.ts";

it("holds figures, question, method and script, so that a table can be worked out again", () => {
  const table = tableOf(askOf({ down: [{ variable: "sex" }] }));
  const files = unzipSync(tableBundle(table, "# script\n"));
  const read = (name: string) => strFromU8(files[name] ?? new Uint8Array());
  expect(Object.keys(files).sort()).toEqual(["figures.csv", "method.txt", "question.json", "table.R"]);
  expect(Question.parse(JSON.parse(read("question.json")))).toEqual(table.question);
  expect(read("figures.csv")).toContain("people_low");
  expect(read("method.txt")).toContain(table.release.checksum);
  expect(read("table.R")).toBe("# script\n");
});

it("says so where there is no script for such a question", () => {
  const files = unzipSync(tableBundle(tableOf(askOf({})), null));
  expect(Object.keys(files)).not.toContain("table.R");
  expect(strFromU8(files["method.txt"] ?? new Uint8Array())).toContain("There is no script for this kind of question yet");
});
