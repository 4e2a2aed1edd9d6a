import type { ClusterTable } from "./clusterTotals.ts";
import type { Components, Term } from "./components.ts";

/** Which PSUs hold a respondent of each target, as sets of bits. */
export interface Presence {
  psusOf: (target: number) => Uint32Array;
  psusOfEither: (target: number, other: number) => Uint32Array;
}

/** Finds the PSUs that hold at least one counted respondent of each target. */
export function findPresence(table: ClusterTable, components: Components, terms: readonly Term[][]): Presence {
  const psus = table.start.length - 1;
  const words = Math.ceil(psus / 32);
  const { count, cellStart, component } = components;
  const present = new Uint32Array(count * words);
  /** PSUs in which nobody is outside the component: those its complement is absent from. */
  const alone = new Uint32Array(count * words);
  const isTakenAway = new Uint8Array(count);
  for (const term of terms.flat()) if (term.sign < 0) isTakenAway[term.component] = 1;
  const entriesOf = new Uint32Array(count);
  for (let psu = 0; psu < psus; psu++) {
    const first = table.start[psu]!;
    const end = table.start[psu + 1]!;
    const bit = 1 << (psu & 31);
    const word = psu >>> 5;
    for (let entry = first; entry < end; entry++) {
      const cell = table.cell[entry]!;
      for (let slot = cellStart[cell]!; slot < cellStart[cell + 1]!; slot++) {
        const k = component[slot]!;
        present[k * words + word]! |= bit;
        if (isTakenAway[k] === 1) entriesOf[k]! += 1;
      }
    }
    for (let entry = first; entry < end; entry++) {
      const cell = table.cell[entry]!;
      for (let slot = cellStart[cell]!; slot < cellStart[cell + 1]!; slot++) {
        const k = component[slot]!;
        if (entriesOf[k] === end - first) alone[k * words + word]! |= bit;
      }
    }
    for (let entry = first; entry < end; entry++) {
      const cell = table.cell[entry]!;
      for (let slot = cellStart[cell]!; slot < cellStart[cell + 1]!; slot++) entriesOf[component[slot]!] = 0;
    }
  }
  const sets = terms.map(([whole, away]) => {
    const set = present.slice(whole!.component * words, (whole!.component + 1) * words);
    if (away !== undefined) {
      const removed = alone.subarray(away.component * words, (away.component + 1) * words);
      for (let word = 0; word < words; word++) set[word]! &= ~removed[word]!;
    }
    return set;
  });
  return {
    psusOf: (target) => sets[target]!,
    psusOfEither: (target, other) => {
      const second = sets[other]!;
      return sets[target]!.map((word, index) => word | second[index]!);
    },
  };
}

/** PSUs in a set, and strata that hold any of them. Their difference is the degrees of freedom (Korn & Graubard 1999). */
export function countUnits(set: Uint32Array, stratumStart: Uint32Array): { psus: number; strata: number } {
  let psus = 0;
  let strata = 0;
  let stratum = 0;
  let latestStratum = -1;
  for (let word = 0; word < set.length; word++) {
    for (let rest = set[word]!; rest !== 0; rest &= rest - 1) {
      const psu = word * 32 + 31 - Math.clz32(rest & -rest);
      psus++;
      while (stratumStart[stratum + 1]! <= psu) stratum++;
      if (stratum !== latestStratum) strata++;
      latestStratum = stratum;
    }
  }
  return { psus, strata };
}
