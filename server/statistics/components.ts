import type { CellTotals } from "./clusterTotals.ts";
import { type DomainTotals, domainTotals, type Target } from "./domainTotals.ts";

/** Unions of cells whose cluster totals are formed; every target is one of them, or the whole less one of them. */
export interface Components extends ComponentsOfCells {
  count: number;
  domains: DomainTotals[];
}

/** The components of cell c are component[cellStart[c]] to component[cellStart[c + 1] − 1]. */
export interface ComponentsOfCells {
  cellStart: Uint32Array;
  component: Uint32Array;
}

/** A target's clusterwise residual and weight, as Σ sign · (those of the component). */
export interface Term {
  component: number;
  sign: 1 | -1;
}

/** Which components stand for which target. */
export interface ComponentPlan {
  components: Components;
  /** One term, or two: the whole, then what is taken away from it. */
  terms: Term[][];
}

/**
 * A target of most of the cells (everyone but one small group, say) is cheaper as the whole less its complement. Only
 * targets of at least half the people: below that the subtraction would cost digits.
 */
export function planComponents(totals: CellTotals, targets: readonly Target[], domains: readonly DomainTotals[]): ComponentPlan {
  const everyone = Int32Array.from({ length: totals.cells }, (_, cell) => cell);
  const people = totals.weight.reduce((sum, weight) => sum + weight, 0);
  const unions: Target[] = [];
  const known = new Map<string, number>();
  const componentOf = (target: Target) => {
    const key = target.cells.join();
    const found = known.get(key);
    if (found !== undefined) return found;
    known.set(key, unions.length);
    return unions.push(target) - 1;
  };
  const terms = targets.map((target, index): Term[] => {
    const cells = target.cells.length;
    const isMost = cells > 8 && cells < totals.cells && cells > 0.5 * totals.cells && domains[index]!.people > people / 2;
    if (!isMost) return [{ component: componentOf(target), sign: 1 }];
    return [
      { component: componentOf({ cells: everyone }), sign: 1 },
      { component: componentOf({ cells: complement(target, totals.cells) }), sign: -1 },
    ];
  });
  return { components: layOut(totals, unions), terms };
}

function complement(target: Target, cells: number): number[] {
  const inside = new Uint8Array(cells);
  for (const cell of target.cells) inside[cell] = 1;
  return Array.from({ length: cells }, (_, cell) => cell).filter((cell) => inside[cell] === 0);
}

function layOut(totals: CellTotals, unions: readonly Target[]): Components {
  const domains = unions.map((union) => domainTotals(totals, union));
  const cellStart = new Uint32Array(totals.cells + 1);
  for (const union of unions) for (const cell of union.cells) cellStart[cell + 1]! += 1;
  for (let cell = 0; cell < totals.cells; cell++) cellStart[cell + 1]! += cellStart[cell]!;
  const size = cellStart[totals.cells]!;
  const component = new Uint32Array(size);
  const next = cellStart.slice();
  unions.forEach((union, index) => {
    for (const cell of union.cells) component[next[cell]!++] = index;
  });
  return { count: unions.length, domains, cellStart, component };
}
