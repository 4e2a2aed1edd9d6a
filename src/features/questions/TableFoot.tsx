import type { Table } from "../../../shared/contracts/tables.ts";
import { figureDecimals, formatFigure, formatInterval } from "../../../shared/figures.ts";
import { formatCounted } from "../../../shared/format.ts";
import { averageWords } from "../../../shared/wording.ts";

const ADJUSTED = {
  none: "not adjusted for",
  holm: "after Holm over",
  "benjamini-hochberg": "after Benjamini–Hochberg over",
} as const;

function everyoneWords({ whole, measure, question }: Table): string | null {
  if (!whole.shown || whole.estimate === null) return null;
  const interval = formatInterval(measure, whole.low, whole.high);
  const estimate = formatFigure(measure, whole.estimate, figureDecimals(measure, whole.low, whole.high));
  return `Everyone: ${estimate}${measure === "share" ? " of every 100" : "quantile" in question.outcome ? "" : " on average"}${interval ? ` (${interval})` : ""}, ${formatCounted(whole.respondents, "respondent")}.`;
}

/** “means”, “medians”, “90th percentiles”. */
const plural = (word: string) => `${word}s`;

/** What the marks of the table mean, and where its figures come from. */
export function TableFoot({ table }: { table: Table }) {
  const { comparison, adjustment, level } = table.question;
  const hasWithheld = [...table.cells, ...table.margins, table.whole].some((cell) => !cell.shown);
  return (
    <div className="measure mt-4 space-y-2 text-[0.8125rem] leading-relaxed text-muted">
      <p>
        {everyoneWords(table)}{" "}
        {table.measure === "share"
          ? "Numbers are of every 100 people"
          : `Numbers are ${plural(averageWords(table.question.outcome))}`}
        , with {`${level}\u00a0%`} intervals.
        {comparison.kind !== "none" && (
          <>
            {" "}
            ▲ higher and ▼ lower than the comparison, ○ no difference shown, {ADJUSTED[adjustment]}{" "}
            {formatCounted(table.familySize, "comparison")}. Dashed line: the comparison. “No difference shown” isn't “no
            difference”.
          </>
        )}
        {hasWithheld && " A withheld figure isn't a small one."}
      </p>
      <div className="hidden space-y-1 print:block">
        <p>{table.caption}</p>
        {table.notes.map((note) => (
          <p key={note}>{note}</p>
        ))}
      </div>
    </div>
  );
}
