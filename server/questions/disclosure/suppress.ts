import type { DisclosureMinimums } from "../../../shared/contracts/design.ts";
import type { TableLine } from "../nodes.ts";
import { boundsOfWithheld, type KnownParts } from "./audit.ts";
import { isTooFew, type Counts } from "./counts.ts";

/** Why a figure is withheld; null where it is shown. */
export type Withholding = "too-few" | "protects-another" | "empty" | null;

interface Table {
  counts: readonly Counts[];
  lines: readonly TableLine[];
}

/** The three ways in which people of a table are counted, with how uncertain each withheld count must stay. */
function systems(table: Table, minimums: DisclosureMinimums): { counts: number[]; enough: number }[] {
  const respondents = { counts: table.counts.map((counts) => counts.respondents), enough: Math.max(1, minimums.respondents) };
  if (table.counts.some((counts) => counts.affected === null)) return [respondents];
  return [
    respondents,
    { counts: table.counts.map((counts) => counts.affected ?? 0), enough: Math.max(1, minimums.affected) },
    {
      counts: table.counts.map((counts) => counts.respondents - (counts.affected ?? 0)),
      enough: Math.max(1, minimums.unaffected),
    },
  ];
}

/** The smallest shown figure of a line that isn't empty, children before the parent, the whole (node 0) last; null where none is left. */
function nextOf(line: TableLine, table: Table, withheld: readonly Withholding[]): number | null {
  const open = line.children.filter((node) => withheld[node] === null);
  open.sort((a, b) => table.counts[a]!.respondents - table.counts[b]!.respondents || a - b);
  return open[0] ?? (withheld[line.parent] === null ? line.parent : null);
}

/** Withholds more in each line until what a line keeps back is at least the minimums, so that no line gives one figure away by itself. */
function closeLines(table: Table, minimums: DisclosureMinimums, withheld: Withholding[]): void {
  const kinds = systems(table, minimums);
  const isHidden = (node: number) => withheld[node] === "too-few" || withheld[node] === "protects-another";
  let isChanged = true;
  while (isChanged) {
    isChanged = false;
    for (const line of table.lines) {
      const hidden = line.children.filter(isHidden);
      if (hidden.length === 0 || isHidden(line.parent)) continue;
      const isEnough =
        hidden.length > 1 && kinds.every(({ counts, enough }) => hidden.reduce((sum, node) => sum + counts[node]!, 0) >= enough);
      if (isEnough) continue;
      const next = nextOf(line, table, withheld);
      if (next === null) continue;
      withheld[next] = "protects-another";
      isChanged = true;
    }
  }
}

/** Of the lines that touch a node, the shown figure whose loss costs least; null where all are withheld already. */
function nextAround(node: number, table: Table, withheld: readonly Withholding[]): number | null {
  const around = table.lines.filter((line) => line.parent === node || line.children.includes(node));
  const candidates = around.map((line) => nextOf(line, table, withheld)).filter((next) => next !== null);
  candidates.sort(
    (a, b) => Number(a === 0) - Number(b === 0) || table.counts[a]!.respondents - table.counts[b]!.respondents || a - b,
  );
  return candidates[0] ?? null;
}

/** More figures below the minimums than this can't be audited quickly; such a table shows little anyway. */
const SPARSE_LIMIT = 300;

/** A table so sparse that what may be shown of it can't be worked out in reasonable time. */
export class SparseTableError extends Error {
  override readonly name = "SparseTableError";
}

/**
 * Decides which figures of a table may be shown: primary suppression by the release's minimums, then secondary until
 * no withheld count can be worked out, from all that is shown, to less than the minimums' width (checked by linear programming).
 * Sources: Handbook on Statistical Disclosure Control (2nd ed.), §5.2–5.5.
 * @throws {SparseTableError} Nearly everything would be withheld.
 * @param table Counts of every node and the lines along which they add up.
 */
export async function suppress(table: Table, minimums: DisclosureMinimums): Promise<Withholding[]> {
  const withheld = table.counts.map((counts): Withholding =>
    counts.respondents === 0 ? "empty" : isTooFew(counts, minimums) ? "too-few" : null,
  );
  const tooFew = withheld.filter((reason) => reason === "too-few").length;
  if (tooFew === 0) return withheld;
  if (tooFew > SPARSE_LIMIT)
    throw new SparseTableError(
      `Of this table's ${withheld.length} figures ${tooFew} have too few respondents to be shown, and many more would have to be withheld with them. Split by less, or use wider bands.`,
    );
  const known = systems(table, minimums).map((): KnownParts => new Map());
  for (;;) {
    closeLines(table, minimums, withheld);
    const isWithheld = withheld.map((reason) => reason === "too-few" || reason === "protects-another");
    const exposed = new Set<number>();
    for (const [i, { counts, enough }] of systems(table, minimums).entries()) {
      const bounds = await boundsOfWithheld({ counts, isWithheld, lines: table.lines }, enough, known[i]);
      bounds.forEach((range, node) => range && range[1] - range[0] < enough && exposed.add(node));
    }
    // One more figure for each exposed one, then all is looked at again.
    let isMore = false;
    for (const node of exposed) {
      const next = nextAround(node, table, withheld);
      if (next === null) continue;
      withheld[next] = "protects-another";
      isMore = true;
    }
    if (!isMore) return withheld;
  }
}
