/** What was measured: times of single runs in milliseconds, and what one run does. */
export interface Measurement {
  name: string;
  runs: number[];
  /** Rows or other units that one run works through; null where it makes no sense. */
  units: number | null;
}

/** Middle, least and greatest of the runs. */
export function summary({ runs }: Measurement): { medianMs: number; leastMs: number; greatestMs: number } {
  const sorted = [...runs].sort((a, b) => a - b);
  return { medianMs: sorted[sorted.length >> 1]!, leastMs: sorted[0]!, greatestMs: sorted.at(-1)! };
}

/** Times some runs after some that aren't counted. */
export async function measure(
  name: string,
  options: { warmUp: number; runs: number; units?: number },
  run: (turn: number) => unknown,
): Promise<Measurement> {
  for (let turn = 0; turn < options.warmUp; turn++) await run(-1 - turn);
  const runs: number[] = [];
  for (let turn = 0; turn < options.runs; turn++) {
    const start = performance.now();
    await run(turn);
    runs.push(performance.now() - start);
  }
  return { name, runs, units: options.units ?? null };
}
