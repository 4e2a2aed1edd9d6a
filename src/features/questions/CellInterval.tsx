import type { ShownCell } from "../../../shared/contracts/tables.ts";
import { toneFill, toneStroke } from "../../charts/tones.ts";

/** The estimate and its interval on the scale that the whole table shares; dashed: what it is compared with. */
export function CellInterval({ cell, extent: [from, to] }: { cell: ShownCell; extent: readonly [number, number] }) {
  const { estimate, low, high, comparison } = cell;
  if (estimate === null) return null;
  const at = (value: number) => `${(2 + (96 * (value - from)) / (to - from)).toFixed(2)}%`;
  const tone = comparison?.direction ?? "plain";
  const reference = comparison?.reference ?? null;
  return (
    <svg aria-hidden="true" className="my-0.5 block h-3.5 w-full overflow-visible">
      <line x1="0" x2="100%" y1="7" y2="7" className="stroke-line" />
      {low !== null && high !== null && (
        <line
          x1={at(low)}
          x2={at(high)}
          y1="7"
          y2="7"
          strokeWidth="3"
          strokeLinecap="round"
          strokeOpacity="0.55"
          className={toneStroke[tone]}
        />
      )}
      {reference !== null && (
        <line x1={at(reference)} x2={at(reference)} y1="0" y2="14" strokeDasharray="2 2" className="stroke-ink" />
      )}
      <circle cx={at(estimate)} cy="7" r="3.25" strokeWidth="1.75" className={`${toneFill[tone]} ${toneStroke[tone]}`} />
    </svg>
  );
}
