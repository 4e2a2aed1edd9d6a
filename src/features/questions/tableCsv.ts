import Papa from "papaparse";
import type { Cell, OverallResult, Table } from "../../../shared/contracts/tables.ts";
import { guardTextCell } from "../../../shared/csv.ts";
import { withheldWords } from "../../../shared/reading.ts";
import { cellsById, groupName } from "./pivot.ts";

const FIGURES = [
  "respondents",
  "affected_respondents",
  "people",
  "people_se",
  "people_low",
  "people_high",
  "affected_people",
  "affected_people_se",
  "affected_people_low",
  "affected_people_high",
  "estimate",
  "se",
  "low",
  "high",
  "df",
  "design_effect",
  "effective_respondents",
  "cv",
  "reference",
  "difference",
  "difference_se",
  "difference_low",
  "difference_high",
  "difference_df",
  "p",
  "p_adjusted",
  "ratio",
  "ratio_low",
  "ratio_high",
  "odds_ratio",
  "odds_ratio_low",
  "odds_ratio_high",
  "detectable_difference",
] as const;

function figures(cell: Cell): (number | null)[] {
  if (!cell.shown) return FIGURES.map(() => null);
  const c = cell.comparison;
  return [
    cell.respondents,
    cell.affectedRespondents,
    cell.people,
    cell.peopleSe,
    cell.peopleLow,
    cell.peopleHigh,
    cell.affectedPeople,
    cell.affectedPeopleSe,
    cell.affectedPeopleLow,
    cell.affectedPeopleHigh,
    cell.estimate,
    cell.se,
    cell.low,
    cell.high,
    cell.df,
    cell.deff,
    cell.effectiveRespondents,
    cell.cv,
    ...[c?.reference, c?.difference, c?.se, c?.low, c?.high, c?.df, c?.p, c?.pAdjusted].map((value) => value ?? null),
    ...[c?.ratio, c?.ratioLow, c?.ratioHigh, c?.oddsRatio, c?.oddsRatioLow, c?.oddsRatioHigh, c?.detectable].map(
      (value) => value ?? null,
    ),
  ];
}

/** What is said of the table as a whole, one line for each figure. */
function overallLines({ title, figures: all, p, df }: OverallResult): string[] {
  const written = all.map(
    ({ name, unit, estimate, se, low, high }) =>
      `${title} ${name} (${unit}): ${[estimate, se, low, high].map((value) => value ?? "").join("; ")}`,
  );
  return p === null ? written : [...written, `${title} p: ${p} on ${df ?? ""} degrees of freedom`];
}

/**
 * The table as CSV: one line for each group and margin with figures at full precision, estimates as fractions; then,
 * after an empty line, where they come from, how they were worked out and how to read them.
 */
export function tableCsv(table: Table): string {
  const splits = table.breakdowns.flatMap(({ name, label }) => [label || name, `${name} code`]);
  const header = ["group", ...splits, "status", ...FIGURES, "reliability", "reliability_reasons"];
  const lines = [...cellsById(table).values()].map((cell) => [
    guardTextCell(groupName(table, cell.key)),
    ...table.breakdowns.flatMap(({ values }, index) => {
      const code = cell.key[index] ?? null;
      const value = values.find((value) => value.code === code)?.label ?? code;
      return [value ?? "Everyone", code ?? ""].map(guardTextCell);
    }),
    cell.shown ? "shown" : `withheld: ${withheldWords[cell.reason]}`,
    ...figures(cell),
    cell.shown ? cell.reliability.verdict : "",
    cell.shown ? guardTextCell(cell.reliability.reasons.join("; ")) : "",
  ]);
  const { release } = table;
  const notes = [
    `Question: ${table.caption}`,
    `Source: ${release.surveyTitle}, ${release.wave}; microdata checksum ${release.checksum}; engine ${table.engine}`,
    `Estimates are ${table.measure === "share" ? "fractions of people: 0.127 is 12.7 of every 100" : "means in the variable's own units"}; intervals at ${table.question.level} %`,
    ...table.notes,
    ...table.overall.flatMap(overallLines),
  ];
  return Papa.unparse([header.map(guardTextCell), ...lines, [], ...notes.map((note) => [guardTextCell(note)])], {
    newline: "\r\n",
  });
}
