import { describe, expect, it } from "vitest";
import { comparisonsOf, tableShape } from "../../server/questions/nodes.ts";

describe("tableShape", () => {
  it("has the whole first, then every subtotal and cell of two breakdowns", () => {
    const { nodes } = tableShape([2], [3]);
    expect(nodes.map(({ kind, key }) => `${kind} ${key.map((value) => value ?? "*").join("")}`)).toEqual([
      "whole **",
      "margin *0",
      "margin *1",
      "margin *2",
      "margin 0*",
      "margin 1*",
      "cell 00",
      "cell 01",
      "cell 02",
      "cell 10",
      "cell 11",
      "cell 12",
    ]);
  });

  it("counts respondents without a value in the whole and the subtotals, never in a cell", () => {
    const { nodes } = tableShape([2], []);
    // Base cells 0 and 1 are the values, 2 those without one.
    expect(nodes.map(({ cells }) => [...cells])).toEqual([[0, 1, 2], [0], [1]]);
  });

  it("adds a row up across and a column up down", () => {
    const { nodes, lines } = tableShape([2], [2]);
    const name = (node: number) => nodes[node]!.key.map((value) => value ?? "*").join("");
    expect(lines.map(({ parent, children }) => `${name(parent)} = ${children.map(name).join(" + ")}`)).toEqual([
      "** = 0* + 1*",
      "** = *0 + *1",
      "*0 = 00 + 10",
      "*1 = 01 + 11",
      "0* = 00 + 01",
      "1* = 10 + 11",
    ]);
  });
});

describe("comparisonsOf", () => {
  const shape = tableShape([2], [2]);
  it("sets each group against the one with the reference value and the same other values, and the reference against nothing", () => {
    const against = comparisonsOf(shape, { kind: "group", breakdown: "sex", value: "1" }, 1, 0);
    const keyed = Object.fromEntries(shape.nodes.map(({ key }, i) => [key.map((value) => value ?? "*").join(""), against[i]]));
    const indexOf = (key: string) => shape.nodes.findIndex((node) => node.key.map((value) => value ?? "*").join("") === key);
    expect(keyed).toEqual({
      "**": null,
      "*0": null,
      "*1": { node: indexOf("*0") },
      "0*": null,
      "1*": null,
      "00": null,
      "01": { node: indexOf("00") },
      "10": null,
      "11": { node: indexOf("10") },
    });
  });

  it("never sets the whole against the rest or itself", () => {
    expect(comparisonsOf(shape, { kind: "rest" }, -1, -1)[0]).toBeNull();
    expect(comparisonsOf(shape, { kind: "all" }, -1, -1)[0]).toBeNull();
  });
});
