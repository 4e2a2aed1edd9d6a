import type { ClusterTable } from "./clusterTotals.ts";
import type { Target } from "./domainTotals.ts";

const FEW_CELLS = 32;

/** Finds the PSUs that hold at least one counted respondent of a domain, as a set of bits. */
export type PresenceOf = (target: Target) => Uint32Array;

/** @param table PSUs × cells. */
export function presenceFinder(table: ClusterTable, cells: number): PresenceOf {
  const psus = table.start.length - 1;
  const words = Math.ceil(psus / 32);
  const maskWords = Math.ceil(cells / 32);
  const psusOfCell = new Uint32Array(cells * words);
  const cellsOfPsu = new Uint32Array(psus * maskWords);
  for (let psu = 0; psu < psus; psu++) {
    const bit = 1 << (psu & 31);
    const word = psu >>> 5;
    const mask = psu * maskWords;
    const end = table.start[psu + 1]!;
    for (let entry = table.start[psu]!; entry < end; entry++) {
      const cell = table.cell[entry]!;
      psusOfCell[cell * words + word]! |= bit;
      cellsOfPsu[mask + (cell >>> 5)]! |= 1 << (cell & 31);
    }
  }
  return ({ cells: wanted }) => {
    const set = new Uint32Array(words);
    // By cells where they are few, by PSUs where most have some.
    if (wanted.length <= FEW_CELLS) {
      for (const cell of wanted) {
        const from = cell * words;
        for (let word = 0; word < words; word++) set[word]! |= psusOfCell[from + word]!;
      }
      return set;
    }
    const mask = new Uint32Array(maskWords);
    for (const cell of wanted) mask[cell >>> 5]! |= 1 << (cell & 31);
    for (let psu = 0; psu < psus; psu++) {
      for (let word = 0; word < maskWords; word++) {
        if ((cellsOfPsu[psu * maskWords + word]! & mask[word]!) === 0) continue;
        set[psu >>> 5]! |= 1 << (psu & 31);
        break;
      }
    }
    return set;
  };
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
