import type { Assignment, Sample } from "../../../server/statistics/types.ts";

/** One respondent of a test, in any order. */
export interface Row {
  stratum?: string | number;
  psu?: string | number;
  unit?: string | number;
  weight?: number;
  /** Base cell, or null outside the population. */
  cell?: number | null;
  y?: number | null;
  stratumPopulation?: number;
  psuPopulation?: number;
  replicates?: number[];
}

/** How a test's rows are to be laid out. */
export interface BuildOptions {
  lonely?: Sample["lonely"];
  cells?: number;
  isBinary?: boolean;
  replicates?: Omit<NonNullable<Sample["replicates"]>, "weights">;
}

/** Rows sorted by stratum, PSU and second-stage unit, with the runs' starts: what a release's layout holds. */
export function buildSample(
  rows: readonly Row[],
  options: BuildOptions = {},
): { sample: Sample; assignment: Assignment; order: number[] } {
  const keyed = rows.map((row, index) => ({
    row,
    index,
    stratum: String(row.stratum ?? "all"),
    psu: String(row.psu ?? `row ${index}`),
    unit: String(row.unit ?? `row ${index}`),
  }));
  const compare = (a: string, b: string) => (a < b ? -1 : a > b ? 1 : 0);
  keyed.sort((a, b) => compare(a.stratum, b.stratum) || compare(a.psu, b.psu) || compare(a.unit, b.unit) || a.index - b.index);
  const psuStart: number[] = [];
  const stratumStart: number[] = [];
  const unitStart: number[] = [];
  const psuUnitStart: number[] = [];
  const stratumPopulation: number[] = [];
  const psuPopulation: number[] = [];
  keyed.forEach((current, index) => {
    const before = keyed[index - 1];
    const newStratum = before?.stratum !== current.stratum;
    const newPsu = newStratum || before.psu !== current.psu;
    const newUnit = newPsu || before.unit !== current.unit;
    if (newStratum) {
      stratumStart.push(psuStart.length);
      stratumPopulation.push(current.row.stratumPopulation ?? NaN);
    }
    if (newPsu) {
      psuStart.push(index);
      psuUnitStart.push(unitStart.length);
      psuPopulation.push(current.row.psuPopulation ?? NaN);
    }
    if (newUnit) unitStart.push(index);
  });
  const ordered = keyed.map(({ row }) => row);
  const cell = Int32Array.from(ordered, (row) => (row.y === null || row.cell === null ? -1 : (row.cell ?? 0)));
  const hasPopulation = ordered[0]?.stratumPopulation !== undefined;
  const hasSecondStage = ordered[0]?.psuPopulation !== undefined;
  const replicateCount = ordered[0]?.replicates?.length ?? 0;
  return {
    sample: {
      weight: Float64Array.from(ordered, (row) => row.weight ?? 1),
      psuStart: Uint32Array.from([...psuStart, rows.length]),
      stratumStart: Uint32Array.from([...stratumStart, psuStart.length]),
      lonely: options.lonely ?? "centred",
      stratumPopulation: hasPopulation ? Float64Array.from(stratumPopulation) : null,
      secondStage: hasSecondStage
        ? {
            unitStart: Uint32Array.from([...unitStart, rows.length]),
            psuUnitStart: Uint32Array.from([...psuUnitStart, unitStart.length]),
            psuPopulation: Float64Array.from(psuPopulation),
          }
        : null,
      replicates: options.replicates
        ? {
            ...options.replicates,
            weights: Array.from({ length: replicateCount }, (_, r) => Float64Array.from(ordered, (row) => row.replicates![r]!)),
          }
        : null,
    },
    assignment: {
      cell,
      cells: options.cells ?? Math.max(0, ...cell) + 1,
      outcome: Float64Array.from(ordered, (row) => row.y ?? 0),
      isBinary: options.isBinary ?? ordered.every((row) => row.y === null || row.y === undefined || row.y === 0 || row.y === 1),
    },
    order: keyed.map(({ index }) => index),
  };
}
