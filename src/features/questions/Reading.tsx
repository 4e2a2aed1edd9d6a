import type { Cell, ShownCell, Table } from "../../../shared/contracts/tables.ts";
import { figureDecimals, formatDifference, formatDifferenceInterval, formatFigure } from "../../../shared/figures.ts";
import { formatCount, formatP, formatPeople, formatSignificant } from "../../../shared/format.ts";
import { differenceSentences, correctionSentence, estimateSentence, withheldSentences } from "../../../shared/reading.ts";
import type { NamedVariable } from "../../../shared/wording.ts";
import { DotField } from "../../charts/DotField.tsx";
import { Facts } from "../../components/Facts.tsx";
import { groupName, groupParts } from "./pivot.ts";
import { ReliabilityMark, WithheldMark } from "./PivotCell.tsx";
import { readingContext } from "./readingContext.ts";

type Fact = Parameters<typeof Facts>[0]["facts"][number];

const isFact = (fact: Fact | null): fact is Fact => fact !== null;

function peopleFact(label: string, people: number, low: number | null, high: number | null): Fact {
  const interval = low === null || high === null ? {} : { note: `${formatPeople(low)} to ${formatPeople(high)}.` };
  return { label, value: formatPeople(people), ...interval };
}

/** A ratio with its interval; null where it is undefined. */
function ratioFact(label: string, ratio: number | null, low: number | null, high: number | null): Fact | null {
  if (ratio === null) return null;
  const interval = low === null || high === null ? "" : ` (${formatSignificant(low)} to ${formatSignificant(high)})`;
  return { label, value: `${formatSignificant(ratio)}${interval}` };
}

function comparisonFacts({ comparison }: ShownCell, table: Table): (Fact | null)[] {
  if (!comparison || comparison.difference === null) return [];
  const { difference, low, high, p, pAdjusted, detectable } = comparison;
  const kind = table.measure;
  const unit = kind === "share" ? "points" : "units";
  const interval = formatDifferenceInterval(kind, low, high);
  const isAdjusted = table.question.adjustment !== "none";
  return [
    {
      label: `Difference, ${unit}`,
      value: formatDifference(kind, difference, figureDecimals(kind, low, high)),
      ...(interval ? { note: `${interval} (${table.question.level} % interval)` } : {}),
    },
    ratioFact("Ratio", comparison.ratio, comparison.ratioLow, comparison.ratioHigh),
    ratioFact("Odds ratio", comparison.oddsRatio, comparison.oddsRatioLow, comparison.oddsRatioHigh),
    p === null ? null : { label: "p for the difference", value: formatP(p) },
    !isAdjusted || pAdjusted === null
      ? null
      : { label: "p, adjusted", value: formatP(pAdjusted), note: `Over this table's ${table.familySize} comparisons.` },
    detectable === null
      ? null
      : {
          label: "Detectable difference",
          value: formatFigure(kind, detectable, figureDecimals(kind, 0, detectable)),
          note: "The smallest true one found four times in five.",
        },
  ];
}

function facts(cell: ShownCell, table: Table): Fact[] {
  const { reliability } = cell;
  return [
    { label: "Respondents", value: formatCount(cell.respondents) },
    cell.affectedPeople === null
      ? null
      : peopleFact("People affected", cell.affectedPeople, cell.affectedPeopleLow, cell.affectedPeopleHigh),
    peopleFact("People in the group", cell.people, cell.peopleLow, cell.peopleHigh),
    ...comparisonFacts(cell, table),
    cell.deff === null ? null : { label: "Design effect", value: formatSignificant(cell.deff) },
    {
      label: "Degrees of freedom",
      value: formatCount(cell.df),
      note: `The whole design has ${formatCount(table.release.designDf)}.`,
    },
    cell.clipped ? { label: "Interval", value: "cut off", note: "The linear interval went past 0 or 100." } : null,
    {
      label: "Reliability",
      value: reliability.verdict === "reliable" ? "reliable" : <ReliabilityMark cell={cell} />,
      ...(reliability.reasons.length > 0 ? { note: `${reliability.reasons.join("; ")}.` } : {}),
    },
  ].filter(isFact);
}

function ShownReading({ cell, table, variables }: { cell: ShownCell; table: Table; variables: readonly NamedVariable[] }) {
  const context = readingContext(table, cell.key, variables);
  const sentence = estimateSentence(cell, context);
  const { estimate, low, high } = cell;
  return (
    <>
      {table.measure === "share" && estimate !== null && (
        <div className="mt-4">
          <DotField estimate={estimate} low={low ?? estimate} high={high ?? estimate} text={sentence} />
        </div>
      )}
      <p className="mt-4 text-[1.0625rem] leading-relaxed">
        {[sentence, ...differenceSentences(cell, context), correctionSentence(context)].filter((part) => part !== null).join(" ")}
      </p>
      <div className="mt-5">
        <Facts facts={facts(cell, table)} />
      </div>
    </>
  );
}

function WithheldReading({ reason }: { reason: Extract<Cell, { shown: false }>["reason"] }) {
  return (
    <div className="mt-4 space-y-3">
      <p className="flex items-center gap-2 font-medium">
        <WithheldMark /> {reason === "empty" ? "No one" : "Withheld"}
      </p>
      <p>{withheldSentences[reason]}</p>
      {reason !== "empty" && (
        <p className="text-muted">It isn't small because it is withheld. Fewer or wider groups may show a figure.</p>
      )}
    </div>
  );
}

/** What the chosen cell means, how sure it is, and how it was worked out. */
export function Reading({ cell, table, variables }: { cell: Cell; table: Table; variables: readonly NamedVariable[] }) {
  const parts = groupParts(table, cell.key);
  return (
    <section id="reading" aria-labelledby="reading-title" className="scroll-mt-4">
      <p className="text-[0.8125rem] font-medium text-action">Reading</p>
      <h2 id="reading-title" className="mt-1 text-lg leading-snug font-semibold">
        {groupName(table, cell.key)}
      </h2>
      {parts.length > 0 && <p className="text-[0.8125rem] text-muted">{parts.map(({ breakdown }) => breakdown).join(", ")}</p>}
      {cell.shown ? <ShownReading cell={cell} table={table} variables={variables} /> : <WithheldReading reason={cell.reason} />}
      <p className="mt-6 bg-sunken px-3.5 py-3 text-[0.9375rem]">
        Describes the group, not any one person in it. A gap between groups is not by itself its cause. Targeting a group can
        stigmatise it: involve it.
      </p>
      <details className="mt-5 text-[0.8125rem] text-muted print:hidden">
        <summary className="min-h-6 cursor-pointer text-[0.9375rem] text-action">How it was worked out</summary>
        <ul className="mt-2 space-y-2">
          {table.notes.map((note) => (
            <li key={note}>{note}</li>
          ))}
          <li>
            Engine {table.engine}; microdata {table.release.checksum.slice(0, 12)}.
          </li>
        </ul>
      </details>
    </section>
  );
}
