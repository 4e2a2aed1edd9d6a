import { scaleLinear } from "d3-scale";
import type { ReadinessView } from "../../../shared/contracts/readiness.ts";
import { formatCount, formatSignificant } from "../../../shared/format.ts";

type Bins = NonNullable<ReadinessView["weight"]>["histogram"];

const WIDTH = 480;
const HEIGHT = 200;
const EDGE = { top: 8, right: 12, bottom: 40, left: 48 };

/** How many respondents have which weight; the same numbers stand in the table under it. */
export function WeightHistogram({ bins }: { bins: Bins }) {
  const [first, last] = [bins[0], bins.at(-1)];
  if (!first || !last) return null;
  const most = Math.max(...bins.map(({ respondents }) => respondents));
  const x = scaleLinear([first.from, last.to], [EDGE.left, WIDTH - EDGE.right]);
  const y = scaleLinear([0, most], [HEIGHT - EDGE.bottom, EDGE.top]).nice(4);
  const bottom = HEIGHT - EDGE.bottom;
  return (
    <figure>
      <svg
        viewBox={`0 0 ${WIDTH} ${HEIGHT}`}
        className="w-full text-ink"
        role="img"
        aria-label={`Weights from ${formatSignificant(first.from)} to ${formatSignificant(last.to)}; the table below has the counts`}
      >
        {y.ticks(4).map((tick) => (
          <g key={tick} transform={`translate(0 ${y(tick)})`}>
            <line x1={EDGE.left} x2={WIDTH - EDGE.right} className="stroke-line" />
            <text x={EDGE.left - 6} dy="0.35em" textAnchor="end" className="fill-muted text-xs tabular-nums">
              {formatCount(tick)}
            </text>
          </g>
        ))}
        {bins.map((bin) => (
          <rect
            key={bin.from}
            x={x(bin.from) + 0.5}
            width={Math.max(1, x(bin.to) - x(bin.from) - 1)}
            y={y(bin.respondents)}
            height={bottom - y(bin.respondents)}
            className="fill-action"
          />
        ))}
        <line x1={EDGE.left} x2={WIDTH - EDGE.right} y1={bottom} y2={bottom} className="stroke-ink" />
        {x.ticks(6).map((tick) => (
          <text key={tick} x={x(tick)} y={bottom + 16} textAnchor="middle" className="fill-muted text-xs tabular-nums">
            {formatSignificant(tick)}
          </text>
        ))}
        <text x={(EDGE.left + WIDTH - EDGE.right) / 2} y={HEIGHT - 4} textAnchor="middle" className="fill-muted text-xs">
          Weight
        </text>
      </svg>
      <details className="mt-2 text-sm">
        <summary className="link cursor-pointer">The same as a table</summary>
        <table className="mt-2 text-table">
          <caption className="sr-only">Respondents by weight</caption>
          <thead>
            <tr className="border-b border-ink text-left">
              <th scope="col" className="py-1 pr-6 font-semibold">
                Weight
              </th>
              <th scope="col" className="py-1 text-right font-semibold">
                Respondents
              </th>
            </tr>
          </thead>
          <tbody>
            {bins.map((bin) => (
              <tr key={bin.from} className="border-b border-line">
                <td className="py-1 pr-6">
                  {formatSignificant(bin.from)} to {formatSignificant(bin.to)}
                </td>
                <td className="py-1 text-right">{formatCount(bin.respondents)}</td>
              </tr>
            ))}
          </tbody>
        </table>
      </details>
    </figure>
  );
}
