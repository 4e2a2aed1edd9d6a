import { Piscina } from "piscina";
import type { Design } from "../../shared/contracts/design.ts";
import type { Question } from "../../shared/contracts/questions.ts";
import type { Table } from "../../shared/contracts/tables.ts";
import type { Config } from "../config.ts";
import { AppError } from "../errors.ts";
import { numberOfCode, type CodebookVariable } from "../microdata/codebook.ts";
import { ColumnCache } from "../microdata/columnCache.ts";
import { workerOptions } from "../microdata/workers.ts";
import type { Release } from "../models/Release.ts";
import type { Reader } from "../policies/policy.ts";
import { presentTable } from "../presenters/table.ts";
import { AnswerCache } from "./answers.ts";
import { caption } from "./caption.ts";
import { compileQuestion, type CompiledQuestion } from "./compile.ts";
import { tableNotes } from "./notes.ts";
import { tableShape } from "./nodes.ts";
import { fitsComplements, type Answer, type Outcome, type Work } from "./work.ts";

/** Names the way of computing in every answer; raised whenever a figure could come out otherwise. */
export const ENGINE = "Perhundred engine 1";
const ANSWERS_KEPT = 500;

/** What a release is to the questions part. */
export interface AskedRelease {
  release: Release;
  design: Design;
  variables: readonly CodebookVariable[];
  /** Another release of the same survey that groups are compared with. */
  other?: Omit<AskedRelease, "other">;
}

/** Where a release's columns and sample come from. */
export type ColumnSource = Pick<ColumnCache, "column" | "sample">;

/** Answers questions in worker threads. */
export interface Questions {
  /**
   * @throws {AppError} `invalid` where the question doesn't fit the codebook; `unprocessable` where the design refuses.
   */
  table(asked: AskedRelease, question: Question, reader: Reader): Promise<Table>;
  close(): Promise<void>;
}

const numberOfValues = (compiled: CompiledQuestion, axis: "down" | "across") =>
  compiled.breakdowns.filter((breakdown) => breakdown.axis === axis).map((breakdown) => breakdown.values.length);

/** Score of each group of a single breakdown: the numbers that its codes spell, or 1, 2, … where some spell none. */
function scoresOf({ breakdowns }: CompiledQuestion): number[] {
  const [breakdown, second] = breakdowns;
  if (!breakdown || second) return [];
  const scores = breakdown.values.map(({ code }) => numberOfCode(code));
  return scores.some(Number.isNaN) ? scores.map((_, i) => i + 1) : scores;
}

interface WorkSource {
  releaseId: string;
  columns: ColumnSource;
  variables: readonly CodebookVariable[];
  minimums: Design["minimums"] | null;
}

async function loadColumns(compiled: CompiledQuestion, source: WorkSource): Promise<Pick<Work, "columns" | "sample">> {
  const idOf = new Map(source.variables.map((variable) => [variable.name, variable.id]));
  const loaded = await Promise.all(
    compiled.plan.columns.map(
      async (name) => [name, (await source.columns.column(source.releaseId, idOf.get(name)!)).values] as const,
    ),
  );
  return { columns: Object.fromEntries(loaded), sample: await source.columns.sample(source.releaseId) };
}

/** The question over another release. @throws {AppError} `invalid` where its codebook doesn't have the same groups. */
function compileOther(compiled: CompiledQuestion, question: Question, other: Omit<AskedRelease, "other">): CompiledQuestion {
  const same = compileQuestion({ ...question, comparison: { kind: "none" } }, other.variables);
  const codes = ({ breakdowns }: CompiledQuestion) =>
    breakdowns.map(({ values }) => values.map(({ code }) => code).join()).join(";");
  if (codes(same) === codes(compiled) && same.plan.outcome.measure === compiled.plan.outcome.measure) return same;
  const message = `The groups of this table have other codes in ${other.release.wave}, so the two can't be set against each other. Choose another split or another release.`;
  throw new AppError("invalid", message, { comparison: message });
}

/** Gathers what a worker needs; also the way in for checks that run the work in their own thread. */
export async function prepareWork(compiled: CompiledQuestion, question: Question, source: WorkSource): Promise<Work> {
  const { columns, sample } = await loadColumns(compiled, source);
  const { comparison } = question;
  const groupAxis = comparison.kind === "group" ? compiled.breakdowns.findIndex(({ name }) => name === comparison.breakdown) : -1;
  const groupValue =
    comparison.kind === "group" ? compiled.breakdowns[groupAxis]!.values.findIndex(({ code }) => code === comparison.value) : -1;
  return {
    plan: compiled.plan,
    down: numberOfValues(compiled, "down"),
    across: numberOfValues(compiled, "across"),
    columns,
    sample,
    options: { level: question.level, interval: question.interval, difference: question.difference, comparison },
    groupAxis,
    groupValue,
    overall: question.overall,
    scores: scoresOf(compiled),
    other: null,
    minimums: source.minimums,
  };
}

function refuseTooLarge(compiled: CompiledQuestion, question: Question): void {
  if (question.comparison.kind !== "rest") return;
  const figures = tableShape(numberOfValues(compiled, "down"), numberOfValues(compiled, "across")).nodes.length;
  const baseCells = compiled.breakdowns.reduce((product, { values }) => product * (values.length + 1), 1);
  if (fitsComplements(figures, baseCells)) return;
  const message = "This table is too large to compare each group with the rest. Compare with everyone, or split by less.";
  throw new AppError("invalid", message, { comparison: message });
}

/** @param parts.columns Given by tests; otherwise a cache over the database is made. */
export function createQuestions(parts: { config: Config; columns: ColumnCache }): Questions {
  const pool = new Piscina<Work, Outcome>({
    ...workerOptions(new URL("./work.ts", import.meta.url)),
    minThreads: 1,
    maxThreads: parts.config.workers,
  });
  const answers = new AnswerCache<Answer>(ANSWERS_KEPT);

  async function work(asked: AskedRelease, compiled: CompiledQuestion, question: Question): Promise<Answer> {
    const { release, design, variables } = asked;
    const prepared = await prepareWork(compiled, question, {
      releaseId: release.id,
      columns: parts.columns,
      variables,
      minimums: design.minimums,
    });
    if (asked.other) {
      const { release: otherRelease, design: otherDesign, variables: otherVariables } = asked.other;
      const same = compileOther(compiled, question, asked.other);
      const source = {
        releaseId: otherRelease.id,
        columns: parts.columns,
        variables: otherVariables,
        minimums: otherDesign.minimums,
      };
      prepared.other = { plan: same.plan, minimums: otherDesign.minimums, ...(await loadColumns(same, source)) };
    }
    const outcome = await pool.run(prepared);
    if ("refusal" in outcome) throw new AppError("unprocessable", outcome.refusal);
    return outcome.answer;
  }

  return {
    async table(asked, question, reader) {
      const { release, design, variables } = asked;
      const compiled = compileQuestion(question, variables);
      refuseTooLarge(compiled, question);
      const key = `${release.id} ${release.checksum} ${release.version} ${asked.other?.release.checksum ?? ""} ${JSON.stringify(question)}`;
      const answer = await answers.get(key, () => work(asked, compiled, question));
      const measure = compiled.plan.outcome.measure;
      return presentTable(
        {
          question,
          release: {
            id: release.id,
            surveyId: release.surveyId,
            surveyTitle: release.survey!.title,
            wave: release.wave,
            checksum: release.checksum,
            designDf: answer.designDf,
          },
          compared: asked.other ? { id: asked.other.release.id, wave: asked.other.release.wave } : null,
          engine: ENGINE,
          measure,
          breakdowns: compiled.breakdowns,
          caption: caption(question, release, variables, asked.other?.release),
          notes: (familySize) => tableNotes(question, design, measure, familySize),
          hidesUnreliable: !reader.roles.includes("epidemiologist") && !reader.roles.includes("steward"),
        },
        answer,
      );
    },
    async close() {
      await pool.destroy();
    },
  };
}
