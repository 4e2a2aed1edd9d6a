import type { Assignment } from "../statistics/types.ts";
import { FALSE, TRUE, UNKNOWN, type AxisPlan, type NumberSource, type Plan, type Test } from "./plan.ts";

/** The columns of a plan by name, rows in layout order. `code` columns hold category positions, `number` columns NaN for missing. */
export type Columns = Readonly<Record<string, ArrayLike<number>>>;

function columnOf(columns: Columns, name: string): ArrayLike<number> {
  const column = columns[name];
  if (!column) throw new Error(`The column ${name} was not loaded.`);
  return column;
}

/** Truth of a test for each row: FALSE, TRUE or UNKNOWN. */
export function evaluate(test: Test, columns: Columns, rows: number): Uint8Array {
  const truth = new Uint8Array(rows);
  if (test.kind === "codes") {
    const column = columnOf(columns, test.column);
    const lookup = test.truth;
    for (let row = 0; row < rows; row++) truth[row] = lookup[column[row]!] ?? UNKNOWN;
  } else if (test.kind === "range") {
    const column = columnOf(columns, test.column);
    for (let row = 0; row < rows; row++) {
      const value = column[row]!;
      truth[row] =
        value !== value || test.missing.includes(value) ? UNKNOWN : value >= test.low && value <= test.high ? TRUE : FALSE;
    }
  } else if (test.kind === "numbers") {
    const column = columnOf(columns, test.column);
    const values = new Set(test.values);
    for (let row = 0; row < rows; row++) {
      const value = column[row]!;
      truth[row] = value !== value || test.missing.includes(value) ? UNKNOWN : values.has(value) ? TRUE : FALSE;
    }
  } else if (test.kind === "not") {
    const inner = evaluate(test.test, columns, rows);
    for (let row = 0; row < rows; row++) truth[row] = inner[row] === UNKNOWN ? UNKNOWN : 1 - inner[row]!;
  } else {
    combine(
      test.kind,
      test.tests.map((part) => evaluate(part, columns, rows)),
      truth,
    );
  }
  return truth;
}

/** Kleene's conjunction and disjunction: one certain part decides, otherwise one unknown part makes the whole unknown. */
function combine(kind: "all" | "any", parts: readonly Uint8Array[], truth: Uint8Array): void {
  const decisive = kind === "all" ? FALSE : TRUE;
  truth.fill(kind === "all" ? TRUE : FALSE);
  for (const part of parts) {
    for (let row = 0; row < truth.length; row++) {
      if (truth[row] === decisive) continue;
      if (part[row] === decisive || part[row] === UNKNOWN) truth[row] = part[row]!;
    }
  }
}

function numbers(source: NumberSource, columns: Columns, rows: number): Float64Array {
  const column = columnOf(columns, source.column);
  const values = new Float64Array(rows);
  if (source.kind === "codes") {
    for (let row = 0; row < rows; row++) values[row] = source.values[column[row]!] ?? Number.NaN;
    return values;
  }
  const { missing } = source;
  for (let row = 0; row < rows; row++) {
    const value = column[row]!;
    values[row] = missing.length > 0 && missing.includes(value) ? Number.NaN : value;
  }
  return values;
}

/** Folds one axis into the cell indexes: the last slot of each axis holds those in none of its groups. */
function applyAxis(axis: AxisPlan, columns: Columns, cell: Int32Array): void {
  const rows = cell.length;
  const slots = axis.values + 1;
  if (axis.kind === "codes") {
    const column = columnOf(columns, axis.column);
    const { group } = axis;
    for (let row = 0; row < rows; row++) {
      const value = group[column[row]!] ?? -1;
      cell[row] = cell[row]! * slots + (value < 0 ? axis.values : value);
    }
    return;
  }
  const values = numbers(axis.source, columns, rows);
  for (let row = 0; row < rows; row++) {
    const value = values[row]!;
    let band = 0;
    while (band < axis.values && !(value >= axis.bands[band]![0] && value <= axis.bands[band]![1])) band++;
    cell[row] = cell[row]! * slots + band;
  }
}

/**
 * Base cell and outcome of every respondent. Cells are numbered with the first axis slowest, the one to standardise by last, each axis one slot wider
 * than its groups for those without a value. Outside the population, without an outcome, or of weight 0: −1.
 */
export function assign(plan: Plan, columns: Columns, weight: Float64Array): Assignment {
  const rows = weight.length;
  const cell = new Int32Array(rows);
  const axes = plan.standard ? [...plan.axes, plan.standard.axis] : plan.axes;
  for (const axis of axes) applyAxis(axis, columns, cell);
  const isBinary = plan.outcome.measure === "share";
  const outcome =
    plan.outcome.measure === "share" ? evaluate(plan.outcome.test, columns, rows) : numbers(plan.outcome.source, columns, rows);
  const among = plan.among ? evaluate(plan.among, columns, rows) : null;
  for (let row = 0; row < rows; row++) {
    const value = outcome[row]!;
    const isKnown = isBinary ? value !== UNKNOWN : value === value;
    if (!isKnown || !(weight[row]! > 0) || (among !== null && among[row] !== TRUE)) cell[row] = -1;
  }
  return { cell, cells: axes.reduce((product, axis) => product * (axis.values + 1), 1), outcome, isBinary };
}

/** Value of every respondent on one axis, −1 for none: a covariate's code. */
export function codesOf(axis: AxisPlan, columns: Columns, rows: number): Int32Array {
  const codes = new Int32Array(rows);
  applyAxis(axis, columns, codes);
  return codes.map((code) => (code === axis.values ? -1 : code));
}
