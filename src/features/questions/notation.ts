import type { Breakdown, Standardisation } from "../../../shared/contracts/questions.ts";
import { Rule } from "../../../shared/rules.ts";
import { bandLabel } from "./bands.ts";

/*
 * How rules and breakdowns are written in an address:
 *   smoking:1,2            one of these codes        age:18..44  age:65..   a range, ends in
 *   a;b                    both at the top           all(a;b)  any(a;b)  not(a)
 *   age(18..24;65..=old)   a variable in bands, with a label where it isn't the usual one
 * Names and codes keep letters, digits, spaces, `_`, `-` and `–`; anything else is `~` hexadecimal code point `~`.
 */

const UNSAFE = /[^\p{L}\p{N}_ –-]/gu;

export const escapeText = (text: string) => text.replace(UNSAFE, (sign) => `~${(sign.codePointAt(0) ?? 0).toString(16)}~`);

export const unescapeText = (text: string) =>
  text.replace(/~([0-9a-f]{1,6})~/gu, (whole, hexadecimal: string) => {
    const point = Number.parseInt(hexadecimal, 16);
    return point <= 0x10ffff ? String.fromCodePoint(point) : whole;
  });

/** Splits at a sign that stands outside brackets. */
export function splitOutside(text: string, sign: string): string[] {
  const parts = [""];
  let depth = 0;
  for (const letter of text) {
    if (letter === "(") depth += 1;
    if (letter === ")") depth -= 1;
    if (letter === sign && depth === 0) parts.push("");
    else parts.push(`${parts.pop() ?? ""}${letter}`);
  }
  return parts;
}

const writeEnds = (from: number | null, to: number | null) => `${from ?? ""}..${to ?? ""}`;

function readEnds(text: string): [number | null, number | null] | null {
  const [from, to, ...more] = text.split("..");
  if (from === undefined || to === undefined || more.length > 0) return null;
  const ends = [from, to].map((end) => (end === "" ? null : Number(end)));
  if (ends.some((end) => end !== null && !Number.isFinite(end))) return null;
  return [ends[0] ?? null, ends[1] ?? null];
}

function writePart(rule: Rule): string {
  if ("in" in rule) return `${escapeText(rule.variable)}:${rule.in.map(escapeText).join(",")}`;
  if ("between" in rule) return `${escapeText(rule.variable)}:${writeEnds(...rule.between)}`;
  if ("not" in rule) return `not(${writePart(rule.not)})`;
  const [word, parts] = "all" in rule ? ["all", rule.all] : ["any", rule.any];
  return `${word}(${parts.map(writePart).join(";")})`;
}

/** A rule as it stands in an address; the parts of an “and” at the top stand side by side. */
export function writeRule(rule: Rule): string {
  return "all" in rule && rule.all.length > 1 ? rule.all.map(writePart).join(";") : writePart(rule);
}

function readPart(text: string): unknown {
  const group = /^(all|any|not)\((.*)\)$/su.exec(text);
  if (group) {
    const [, word, inside = ""] = group;
    const parts = splitOutside(inside, ";").map(readPart);
    if (word === "not") return parts.length === 1 ? { not: parts[0] } : null;
    return word === "all" ? { all: parts } : { any: parts };
  }
  const colon = text.indexOf(":");
  if (colon < 1) return null;
  const variable = unescapeText(text.slice(0, colon));
  const value = text.slice(colon + 1);
  if (value.includes("..")) return { variable, between: readEnds(value) };
  return { variable, in: value.split(",").map(unescapeText) };
}

/** The rule an address holds; null where it can't be read. */
export function readRule(text: string): Rule | null {
  const parts = splitOutside(text, ";").map(readPart);
  const { success, data } = Rule.safeParse(parts.length === 1 ? parts[0] : { all: parts });
  return success ? data : null;
}

/** Breakdowns of one side, separated by commas. */
export function writeBreakdowns(breakdowns: readonly Breakdown[]): string {
  const write = ({ variable, bands }: Breakdown) => {
    if (!bands) return escapeText(variable);
    const written = bands.map(([from, to, label]) => {
      const ends = writeEnds(from, to);
      return label === bandLabel([from, to]) ? ends : `${ends}=${escapeText(label)}`;
    });
    return `${escapeText(variable)}(${written.join(";")})`;
  };
  return breakdowns.map(write).join(",");
}

function readBand(text: string): unknown {
  const [ends = "", ...label] = text.split("=");
  const read = readEnds(ends);
  return read && [...read, label.length > 0 ? unescapeText(label.join("=")) : bandLabel(read)];
}

/** What an address says about one side; still to be checked by the contract. */
export function readBreakdowns(text: string): unknown[] {
  return splitOutside(text, ",").map((part) => {
    const [, name = part, bands] = /^([^(]*)\((.*)\)$/su.exec(part) ?? [];
    return { variable: unescapeText(name), ...(bands === undefined ? {} : { bands: bands.split(";").map(readBand) }) };
  });
}

/** A standardisation: `age(18..44;45..)@who-2000-2025` by a published standard, `agecat@0.4,0.6` by weights of one's own. */
export function writeStandardisation({ variable, bands, weights }: Standardisation): string {
  const by = "standard" in weights ? weights.standard : weights.own.join(",");
  return `${writeBreakdowns([{ variable, ...(bands ? { bands } : {}) }])}@${by}`;
}

/** What an address standardises by; null where it can't be read. */
export function readStandardisation(text: string): unknown {
  const at = text.lastIndexOf("@");
  const [breakdown] = readBreakdowns(text.slice(0, at));
  const by = text.slice(at + 1);
  if (at < 1 || !breakdown) return null;
  const own = by.split(",").map(Number);
  return { ...breakdown, weights: own.some(Number.isNaN) ? { standard: by } : { own } };
}
