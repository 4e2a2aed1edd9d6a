import { z } from "zod";

/** A category's code as text; numbers are taken as the text they print as, so `1` and `"1"` name the same category. */
export const Code = z
  .union([z.string().max(200), z.number()])
  .transform((code) => String(code))
  .pipe(z.string());
export type Code = z.infer<typeof Code>;

/** Name of a variable as the codebook spells it. */
export const VariableName = z.string().min(1).max(64);

/**
 * Which respondents are meant. A comparison with a missing value is unknown; `all`, `any` and `not` follow
 * Kleene's three-valued logic, so a respondent counts as meant only where the rule is certainly true.
 * `between` takes both ends in; null leaves an end open.
 */
export type Rule =
  | { all: Rule[] }
  | { any: Rule[] }
  | { not: Rule }
  | { variable: string; in: string[] }
  | { variable: string; between: [number | null, number | null] };

const Between = z
  .tuple([z.number().nullable(), z.number().nullable()])
  .refine(([low, high]) => low !== null || high !== null, "Give at least one end.")
  .refine(([low, high]) => low === null || high === null || low <= high, "The low end is above the high end.");

export const Rule: z.ZodType<Rule> = z.lazy(() =>
  z.union([
    z.strictObject({ all: z.array(Rule).min(1).max(20) }),
    z.strictObject({ any: z.array(Rule).min(1).max(20) }),
    z.strictObject({ not: Rule }),
    z.strictObject({ variable: VariableName, in: z.array(Code).min(1).max(500) }),
    z.strictObject({ variable: VariableName, between: Between }),
  ]),
);

/** Names of the variables a rule reads, each once, in order of first use. */
export function ruleVariables(rule: Rule): string[] {
  if ("variable" in rule) return [rule.variable];
  const parts = "all" in rule ? rule.all : "any" in rule ? rule.any : [rule.not];
  return [...new Set(parts.flatMap(ruleVariables))];
}
