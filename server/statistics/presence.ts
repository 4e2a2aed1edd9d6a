import type { ClusterTable } from "./clusterTotals.ts";
import type { Target } from "./domainTotals.ts";

/** Finds the PSUs that hold at least one counted respondent of a domain, as a set of bits. */
export type PresenceOf = (target: Target) => Uint32Array;

/** @param table PSUs × cells. */
export function presenceFinder(table: ClusterTable, cells: number): PresenceOf {
  const psus = table.start.length - 1;
  const words = Math.ceil(psus / 32);
  const present = new Uint32Array(cells * words);
  const anyCell = new Uint32Array(words);
  const severalCells = new Uint32Array(words);
  for (let psu = 0; psu < psus; psu++) {
    const bit = 1 << (psu & 31);
    const word = psu >>> 5;
    const first = table.start[psu]!;
    const end = table.start[psu + 1]!;
    if (end > first) anyCell[word]! |= bit;
    if (end > first + 1) severalCells[word]! |= bit;
    for (let entry = first; entry < end; entry++) present[table.cell[entry]! * words + word]! |= bit;
  }
  return (target) => {
    const set = new Uint32Array(words);
    const left = target.cells.length === cells - 1 ? cellLeftOut(target, cells) : null;
    if (left !== null) {
      // Everyone but one cell is absent only where that cell is alone.
      for (let word = 0; word < words; word++)
        set[word] = severalCells[word]! | (anyCell[word]! & ~present[left * words + word]!);
      return set;
    }
    for (const cell of target.cells) {
      for (let word = 0; word < words; word++) set[word]! |= present[cell * words + word]!;
    }
    return set;
  };
}

function cellLeftOut(target: Target, cells: number): number | null {
  const inside = new Uint8Array(cells);
  for (const cell of target.cells) inside[cell] = 1;
  const missing = inside.indexOf(0);
  return inside.indexOf(0, missing + 1) === -1 ? missing : null;
}

/** PSUs in either set. */
export function eitherOf(left: Uint32Array, right: Uint32Array): Uint32Array {
  return left.map((word, index) => word | right[index]!);
}

/** PSUs in a set, and strata that hold any of them. Their difference is the degrees of freedom (Korn & Graubard 1999). */
export function countUnits(set: Uint32Array, stratumStart: Uint32Array): { psus: number; strata: number } {
  let psus = 0;
  let strata = 0;
  let stratum = 0;
  let nextStratum = 0; // first PSU past the stratum counted last
  for (let word = 0; word < set.length; word++) {
    for (let rest = set[word]!; rest !== 0; rest &= rest - 1) {
      const psu = word * 32 + 31 - Math.clz32(rest & -rest);
      psus++;
      if (psu < nextStratum) continue;
      while (stratumStart[stratum + 1]! <= psu) stratum++;
      nextStratum = stratumStart[stratum + 1]!;
      strata++;
    }
  }
  return { psus, strata };
}
