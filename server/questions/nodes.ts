import type { Comparison } from "../../shared/contracts/questions.ts";

/**
 * One figure of a table: a cell, a subtotal or the whole. `key` has one entry for each axis, down first: the value's
 * index, or null for everyone. `cells` are the base cells it is made of, those without a value included where null.
 */
export interface TableNode {
  key: (number | null)[];
  kind: "whole" | "cell" | "margin";
  cells: Int32Array;
}

/** `parent` is the sum of `children` and of respondents without a value on the axis that is split. */
export interface TableLine {
  parent: number;
  children: number[];
}

/** Every figure of a table and how they add up. Node 0 is the whole; cells come in key order. */
export interface TableShape {
  nodes: TableNode[];
  lines: TableLine[];
}

const keyText = (key: readonly (number | null)[]) => key.map((value) => value ?? "*").join(",");

/** Keys with the first `fixed` axes of `sizes` given and the rest null, first axis slowest. */
function prefixKeys(sizes: readonly number[], fixed: number): (number | null)[][] {
  let keys: (number | null)[][] = [[]];
  sizes.forEach((size, axis) => {
    keys =
      axis < fixed
        ? keys.flatMap((key) => Array.from({ length: size }, (_, value) => [...key, value]))
        : keys.map((key) => [...key, null]);
  });
  return keys;
}

/** Base cells that a key covers; each axis has one slot more than values, for respondents without one. */
function baseCells(key: readonly (number | null)[], sizes: readonly number[]): Int32Array {
  let cells = [0];
  key.forEach((value, axis) => {
    const slots = sizes[axis]! + 1;
    const taken = value === null ? Array.from({ length: slots }, (_, slot) => slot) : [value];
    cells = cells.flatMap((cell) => taken.map((slot) => cell * slots + slot));
  });
  return Int32Array.from(cells);
}

/**
 * Lays out a table's figures: all combinations of a run of leading down values with a run of leading across values.
 * @param down Number of values of each down breakdown. @param across The same for across.
 */
export function tableShape(down: readonly number[], across: readonly number[]): TableShape {
  const sizes = [...down, ...across];
  const nodes: TableNode[] = [];
  const indexOf = new Map<string, number>();
  for (let i = 0; i <= down.length; i++) {
    for (let j = 0; j <= across.length; j++) {
      const isFull = i === down.length && j === across.length;
      for (const downKey of prefixKeys(down, i)) {
        for (const acrossKey of prefixKeys(across, j)) {
          const key = [...downKey, ...acrossKey];
          const kind = i + j === 0 ? "whole" : isFull ? "cell" : "margin";
          indexOf.set(keyText(key), nodes.length);
          nodes.push({ key, kind, cells: baseCells(key, sizes) });
        }
      }
    }
  }
  const lines = nodes.flatMap((node, parent) =>
    [firstOpen(node.key, 0, down.length), firstOpen(node.key, down.length, sizes.length)].flatMap((axis) => {
      if (axis === null) return [];
      const children = Array.from({ length: sizes[axis]! }, (_, value) => indexOf.get(keyText(node.key.with(axis, value)))!);
      return [{ parent, children }];
    }),
  );
  return { nodes, lines };
}

function firstOpen(key: readonly (number | null)[], from: number, to: number): number | null {
  for (let axis = from; axis < to; axis++) if (key[axis] === null) return axis;
  return null;
}

/**
 * What each node is set against: another node, everyone in the table's groups, the others of them, itself in another wave, a fixed value, or nothing.
 * Respondents without a value of a breakdown are in none of the groups.
 */
export type Against = { node: number } | "rest" | "all" | "other" | { fixedValue: number } | null;

/**
 * The comparison of every node, in node order.
 * @param groupAxis Axis of a `group` comparison; @param groupValue index of its reference value.
 */
export function comparisonsOf(shape: TableShape, comparison: Comparison, groupAxis: number, groupValue: number): Against[] {
  const indexOf = new Map(shape.nodes.map((node, i) => [keyText(node.key), i]));
  return shape.nodes.map((node): Against => {
    if (comparison.kind === "none") return null;
    if (comparison.kind === "target") return { fixedValue: comparison.value };
    if (comparison.kind === "release") return "other";
    if (node.kind === "whole") return null;
    if (comparison.kind === "rest") return "rest";
    if (comparison.kind === "all") return "all";
    const own = node.key[groupAxis];
    if (own === null || own === undefined || own === groupValue) return null;
    const reference = indexOf.get(keyText(node.key.with(groupAxis, groupValue)));
    return reference === undefined ? null : { node: reference };
  });
}
