import { readFile } from "node:fs/promises";
import path from "node:path";
import { z } from "zod";
import { Rule } from "../../../shared/rules.ts";

const Names = z.union([z.string(), z.array(z.string())]);
const Level = z.union([z.literal(90), z.literal(95), z.literal(99)]);
const Value = z.union([z.string(), z.number()]);

const CaseDesign = z.object({
  weight: z.string().optional(),
  strata: z.string().optional(),
  psu: Names.optional(),
  fpc: Names.optional(),
  lonely: z.enum(["certainty", "centred", "average"]).optional(),
  replicates: z
    .object({
      pattern: z.string(),
      method: z.string(),
      scale: z.number(),
      rscales: z.union([z.number(), z.array(z.number())]),
      mse: z.boolean(),
    })
    .optional(),
});

const CaseQuery = z.object({
  outcome: z.object({ variable: z.string(), affected: Value.optional() }),
  by: Names.optional(),
  among: Rule.optional(),
  comparison: z.object({ kind: z.string(), variable: z.string().optional(), value: Value.optional() }).optional(),
  levels: z.union([Level, z.array(Level)]).optional(),
  level: Level.optional(),
  standardise: z.object({ variable: z.string(), codes: z.array(Value), weights: z.array(z.number()) }).optional(),
  scores: z.string().optional(),
  model: z.string().optional(),
  adjustFor: z.array(z.string()).optional(),
  reference: Value.optional(),
  ordered: z.string().optional(),
  quantiles: z.array(z.number()).optional(),
});

/** One independent result with its data, as `tests/reference/README.md` describes. */
export const ReferenceCase = z.object({
  id: z.string(),
  kind: z.string(),
  data: z.string(),
  design: CaseDesign,
  query: CaseQuery,
  expected: z.record(z.string(), z.unknown()),
});
export type ReferenceCase = z.infer<typeof ReferenceCase>;

/** Reads `cases.json` of a folder. A case that doesn't follow the format is kept with the reason, to be reported. */
export async function readCases(folder: string): Promise<({ case: ReferenceCase } | { id: string; problem: string })[]> {
  const cases: unknown = JSON.parse(await readFile(path.join(folder, "cases.json"), "utf8"));
  return z
    .array(z.unknown())
    .parse(cases)
    .map((entry, i) => {
      const result = ReferenceCase.safeParse(entry);
      if (result.success) return { case: result.data };
      const id = z.object({ id: z.string() }).safeParse(entry);
      return { id: id.success ? id.data.id : `case ${i + 1}`, problem: z.prettifyError(result.error) };
    });
}

/** One name or several as a list. */
export const asList = <Item>(value: Item | readonly Item[] | undefined): Item[] =>
  value === undefined ? [] : Array.isArray(value) ? [...(value as readonly Item[])] : [value as Item];
