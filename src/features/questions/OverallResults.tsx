import type { OverallResult, Table } from "../../../shared/contracts/tables.ts";
import { formatNumber, formatP, formatPoints, formatPercent, formatSignificant } from "../../../shared/format.ts";

type Figure = OverallResult["figures"][number];

const FORMATS: Record<Figure["unit"], (value: number) => string> = {
  share: (value) => formatPercent(value),
  points: (value) => `${formatPoints(value)} points`,
  value: (value) => formatSignificant(value),
  ratio: (value) => formatNumber(value, 2),
  number: (value) => formatSignificant(value),
};

function figureWords({ unit, estimate, low, high }: Figure): string {
  const format = FORMATS[unit];
  if (estimate === null) return "can't be worked out";
  const bare = (value: number) => format(value).replace(/ points$/, "");
  return low === null || high === null ? format(estimate) : `${format(estimate)} (${bare(low)} to ${bare(high)})`;
}

/** What was worked out of the table as a whole, under it. */
export function OverallResults({ table }: { table: Table }) {
  const asked = table.question.overall.length;
  if (asked === 0) return null;
  if (table.overall.length === 0)
    return (
      <p className="measure mt-6 text-[0.9375rem] text-muted">
        Nothing is said of the table as a whole, since a cell is withheld that this could give away. Split by less to see it.
      </p>
    );
  return (
    <div className="measure mt-8 space-y-6">
      {table.overall.map((result) => (
        <section key={result.kind} aria-label={result.title}>
          <h2 className="font-medium">{result.title}</h2>
          <dl className="mt-2 border-t border-line">
            {result.figures.map((figure) => (
              <div key={figure.name} className="flex justify-between gap-x-6 border-b border-line py-1.5 text-[0.9375rem]">
                <dt className="text-muted">{figure.name}</dt>
                <dd className="text-right tabular-nums">{figureWords(figure)}</dd>
              </div>
            ))}
            {result.p !== null && (
              <div className="flex justify-between gap-x-6 border-b border-line py-1.5 text-[0.9375rem]">
                <dt className="text-muted">
                  p{result.df === null ? "" : `, on ${formatSignificant(result.df)} degrees of freedom`}
                </dt>
                <dd className="text-right tabular-nums">{formatP(result.p)}</dd>
              </div>
            )}
          </dl>
          <p className="mt-2 text-[0.8125rem] text-muted">{result.meaning}</p>
        </section>
      ))}
    </div>
  );
}
