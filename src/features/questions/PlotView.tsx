import type { Table } from "../../../shared/contracts/tables.ts";
import { formatNumber, formatSigned } from "../../../shared/format.ts";
import { breakdownWords, comparisonWords, outcomeWords, type NamedVariable } from "../../../shared/wording.ts";
import { ChartFrame } from "../../charts/ChartFrame.tsx";
import { ForestPlot } from "../../charts/ForestPlot.tsx";
import type { View } from "./address.ts";
import type { CellId } from "./pivot.ts";
import { differenceRows, figureTable, intervalRows } from "./plots.ts";
import { recordDownload } from "./queries.ts";
import { tableCsv } from "./tableCsv.ts";
import { comparedWaves } from "./readingContext.ts";

export interface PlotViewProps {
  table: Table;
  view: Exclude<View, "table">;
  variables: readonly NamedVariable[];
  selected: CellId;
  onSelect: (id: CellId) => void;
}

/** What a plot is about: the outcome, of whom, by what, against what. */
function plotTitle(
  { question, measure, compared }: Table,
  view: PlotViewProps["view"],
  variables: readonly NamedVariable[],
): string {
  const splits = [...question.down, ...question.across];
  const by = breakdownWords(splits, variables);
  const reference = comparisonWords(question.comparison, variables, splits, measure === "mean", comparedWaves({ compared }));
  const outcome = outcomeWords(question.outcome, variables);
  const subject = view === "differences" ? `Difference from ${reference ?? "the comparison"} in ${outcome}` : outcome;
  const unit = measure === "share" ? (view === "differences" ? "percentage points" : "of every 100 people") : "mean";
  return `${subject}, ${unit}${by ? `, by ${by}` : ""}, with ${question.level}\u00a0% intervals`;
}

/** Decimals that tell neighbouring ticks apart. */
const tickText = (value: number) => formatNumber(value, Number.isInteger(value) ? 0 : Math.abs(value) < 0.1 ? 2 : 1);

/** The answer as a picture: estimates or differences, one group to a line. */
export function PlotView({ table, view, variables, selected, onSelect }: PlotViewProps) {
  const isDifference = view === "differences";
  if (isDifference && table.question.comparison.kind === "none")
    return (
      <p className="py-4 text-muted">Nothing is compared. Choose a comparison at the end of the sentence to see differences.</p>
    );
  const rows = isDifference ? differenceRows(table) : intervalRows(table);
  const title = plotTitle(table, view, variables);
  const { release, measure } = table;
  return (
    <ChartFrame
      title={title}
      source={`${release.surveyTitle}, ${release.wave}. Estimates describe groups, never a person.`}
      headers={[
        "Group",
        isDifference ? "Difference" : measure === "share" ? "Of every 100" : "Mean",
        "Respondents",
        "Reliability",
      ]}
      rows={figureTable(table, rows)}
      csv={() => tableCsv(table)}
      onSave={(format) => recordDownload(table.question, format)}
    >
      {(width) => (
        <ForestPlot
          label={title}
          rows={rows}
          width={width}
          axisLabel={
            isDifference ? "lower than the comparison ← 0 → higher" : measure === "share" ? "of every 100 people" : "mean"
          }
          formatTick={
            isDifference
              ? (value) => (value < 0 ? tickText(value) : formatSigned(value, Number.isInteger(value) ? 0 : 1))
              : tickText
          }
          isFromZero={isDifference || measure === "share"}
          hasZeroLine={isDifference}
          selected={selected}
          onSelect={onSelect}
        />
      )}
    </ChartFrame>
  );
}
