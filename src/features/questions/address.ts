import { z } from "zod";
import {
  Adjustment,
  Breakdown,
  Comparison,
  DifferenceMethod,
  IntervalMethod,
  Level,
  Outcome,
  OverallKind,
  Standardisation,
} from "../../../shared/contracts/questions.ts";
import { Rule } from "../../../shared/rules.ts";
import { emptyDraft, tidyDraft, type Draft } from "./draft.ts";
import { defaultMeasures, MEASURES, type Measure } from "./measures.ts";
import {
  escapeText,
  readBreakdowns,
  readRule,
  readStandardisation,
  unescapeText,
  writeBreakdowns,
  writeRule,
  writeStandardisation,
} from "./notation.ts";

export const VIEWS = ["table", "intervals", "differences"] as const;
export type View = (typeof VIEWS)[number];

/** All that an address of the page holds: the question, and how its answer is looked at. */
export interface Ask {
  draft: Draft;
  view: View;
  measures: readonly Measure[];
}

/** What an address means, and which of its parts can't be read. */
export interface ReadAsk extends Ask {
  unread: string[];
}

function writeComparison(comparison: Comparison): string {
  if (comparison.kind === "group") return `${escapeText(comparison.breakdown)}:${escapeText(comparison.value)}`;
  if (comparison.kind === "release") return `@${comparison.releaseId}`;
  return comparison.kind === "target" ? String(comparison.value) : comparison.kind;
}

function readComparison(text: string): unknown {
  if (text.startsWith("@")) return { kind: "release", releaseId: text.slice(1) };
  const [breakdown = "", value, ...more] = text.split(":");
  if (value !== undefined && more.length === 0)
    return { kind: "group", breakdown: unescapeText(breakdown), value: unescapeText(value) };
  return text === "rest" || text === "all" || text === "none"
    ? { kind: text }
    : { kind: "target", value: text === "" ? null : Number(text) };
}

/** What a query may hold as it is; keeps addresses readable. */
const plain = (text: string) =>
  encodeURIComponent(text)
    .replace(/%(?:3A|3B|2C|3D)/gu, decodeURIComponent)
    .replaceAll("%20", "+");

/** The address of an ask, as a search string. Anything at its default is left out, so equal asks have equal addresses. */
export function writeAddress({ draft, view, measures }: Ask): string {
  const { outcome } = draft;
  const isDefault = measures.join() === defaultMeasures.join();
  const parts: [string, string | null][] = [
    ["release", draft.releaseId],
    ["outcome", outcome && "rule" in outcome ? writeRule(outcome.rule) : null],
    ["mean", outcome && "variable" in outcome ? escapeText(outcome.variable) : null],
    ["among", draft.among ? writeRule(draft.among) : null],
    ["down", draft.down.length > 0 ? writeBreakdowns(draft.down) : null],
    ["across", draft.across.length > 0 ? writeBreakdowns(draft.across) : null],
    ["than", draft.comparison.kind === "none" ? null : writeComparison(draft.comparison)],
    ["level", draft.level === emptyDraft.level ? null : String(draft.level)],
    ["interval", draft.interval === emptyDraft.interval ? null : draft.interval],
    ["difference", draft.difference === emptyDraft.difference ? null : draft.difference],
    ["adjusted", draft.adjustment === emptyDraft.adjustment ? null : draft.adjustment],
    ["quantile", outcome && "variable" in outcome && outcome.quantile !== undefined ? String(outcome.quantile) : null],
    ["standard", draft.standardise ? writeStandardisation(draft.standardise) : null],
    ["adjust", draft.adjustFor.length > 0 ? writeBreakdowns(draft.adjustFor) : null],
    ["overall", draft.overall.length > 0 ? draft.overall.join(",") : null],
    ["view", view === "table" ? null : view],
    ["show", isDefault ? null : measures.join(",")],
  ];
  const written = parts.flatMap(([name, value]) => (value === null ? [] : [`${name}=${plain(value)}`]));
  return written.length > 0 ? `?${written.join("&")}` : "";
}

/** A variable splits a table only once; its first place counts. */
const uniqueByVariable = (breakdowns: Breakdown[]) =>
  [...new Map(breakdowns.toReversed().map((breakdown) => [breakdown.variable, breakdown])).values()].toReversed();

/** Reads an address part by part: one that can't be read is named and left out, the rest stands. */
export function readAddress(search: string): ReadAsk {
  const params = new URLSearchParams(search);
  const unread: string[] = [];
  const take = <Value>(name: string, schema: z.ZodType<Value>, read: (text: string) => unknown, otherwise: Value): Value => {
    const text = params.get(name);
    if (text === null) return otherwise;
    const { success, data } = schema.safeParse(read(text));
    if (success) return data;
    unread.push(name);
    return otherwise;
  };
  const asIs = (text: string) => text;
  const outcome = take<Outcome | null>("outcome", Outcome, (text) => ({ rule: readRule(text) }), null);
  const quantile = take<number | null>("quantile", z.number().gt(0).lt(1), Number, null);
  const mean = take<Outcome | null>(
    "mean",
    Outcome,
    (text) => ({ variable: unescapeText(text), ...(quantile === null ? {} : { quantile }) }),
    null,
  );
  const standardise = take<Standardisation | undefined>("standard", Standardisation, readStandardisation, undefined);
  const down = uniqueByVariable(take("down", z.array(Breakdown).max(3), readBreakdowns, []));
  const across = take("across", z.array(Breakdown).max(2), readBreakdowns, []);
  const splits = uniqueByVariable([...down, ...across]);
  const among = take<Rule | undefined>("among", Rule, readRule, undefined);
  const draft: Draft = {
    releaseId: take<string | null>("release", z.uuid(), asIs, null),
    outcome: outcome ?? mean,
    ...(among ? { among } : {}),
    down: splits.slice(0, down.length),
    across: splits.slice(down.length),
    comparison: take("than", Comparison, readComparison, emptyDraft.comparison),
    level: take("level", Level, Number, emptyDraft.level),
    interval: take("interval", IntervalMethod, asIs, emptyDraft.interval),
    difference: take("difference", DifferenceMethod, asIs, emptyDraft.difference),
    adjustment: take("adjusted", Adjustment, asIs, emptyDraft.adjustment),
    ...(standardise ? { standardise } : {}),
    adjustFor: uniqueByVariable(take("adjust", z.array(Breakdown).max(5), readBreakdowns, [])),
    overall: take("overall", z.array(OverallKind), (text) => [...new Set(text.split(","))], []),
  };
  return {
    draft: tidyDraft(draft),
    view: take<View>("view", z.enum(VIEWS), asIs, "table"),
    measures: take("show", z.array(z.enum(MEASURES)), (text) => text.split(",").filter(Boolean), defaultMeasures),
    unread,
  };
}
