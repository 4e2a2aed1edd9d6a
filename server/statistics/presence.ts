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
  for (const word of set) psus += countBits(word);
  let strata = 0;
  for (let stratum = 0; stratum < stratumStart.length - 1; stratum++) {
    if (hasBit(set, stratumStart[stratum]!, stratumStart[stratum + 1]!)) strata++;
  }
  return { psus, strata };
}

/** Bits of a word, added up in pairs, fours and eights side by side. */
function countBits(word: number): number {
  const pairs = word - ((word >>> 1) & 0x55555555);
  const fours = (pairs & 0x33333333) + ((pairs >>> 2) & 0x33333333);
  return Math.imul((fours + (fours >>> 4)) & 0x0f0f0f0f, 0x01010101) >>> 24;
}

/** Whether any bit from `first` up to, not including, `end` is set. */
function hasBit(set: Uint32Array, first: number, end: number): boolean {
  if (end <= first) return false;
  const firstWord = first >>> 5;
  const lastWord = (end - 1) >>> 5;
  const from = -1 << (first & 31);
  const upTo = -1 >>> (31 - ((end - 1) & 31));
  if (firstWord === lastWord) return (set[firstWord]! & from & upTo) !== 0;
  if ((set[firstWord]! & from) !== 0 || (set[lastWord]! & upTo) !== 0) return true;
  for (let word = firstWord + 1; word < lastWord; word++) if (set[word] !== 0) return true;
  return false;
}
