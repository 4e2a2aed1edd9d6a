import type { Design } from "../../shared/contracts/design.ts";

type Declared = NonNullable<Design["replicates"]>;

const RANGE = /^(?<stem>.*?)(?<first>\d+)\s*(?:–|-|to)\s*(?<same>.*?)(?<last>\d+)$/u;

/**
 * Names of the replicate weights a pattern means, in numeric order: first and last column ("repwt1–repwt80", with an
 * en dash, a hyphen or "to"; leading zeros kept), or a stem with an asterisk ("repwt*").
 * @returns Null where the pattern is neither, or names a column that isn't there.
 */
export function expandPattern(pattern: string, names: readonly string[]): string[] | null {
  const known = new Set(names);
  if (pattern.includes("*")) {
    const [before = "", after = "", ...more] = pattern.split("*");
    if (more.length > 0) return null;
    const found = names.filter(
      (name) =>
        name.startsWith(before) && name.endsWith(after) && /^\d+$/.test(name.slice(before.length, name.length - after.length)),
    );
    found.sort((a, b) => a.localeCompare(b, "en", { numeric: true }));
    return found.length > 0 ? found : null;
  }
  const groups = RANGE.exec(pattern)?.groups;
  if (!groups) return null;
  const { stem = "", first = "", same = "", last = "" } = groups;
  if (same !== stem && same !== "") return null;
  const [from, to] = [Number(first), Number(last)];
  if (to < from || to - from > 5000) return null;
  const all = Array.from({ length: to - from + 1 }, (_, i) => `${stem}${String(from + i).padStart(first.length, "0")}`);
  return all.every((name) => known.has(name)) ? all : null;
}

/**
 * The factor before the sum of squared deviations, where the design gives none.
 * Sources: Wolter, Introduction to Variance Estimation (2007), ch. 3–5; Judkins (1990) for Fay's method.
 * @param count Number of replicates.
 */
export function replicateScale({ method, fay, scale }: Declared, count: number): number {
  if (scale !== null) return scale;
  if (method === "BRR") return 1 / count;
  if (method === "Fay") return 1 / (count * (1 - (fay ?? 0.5)) ** 2);
  if (method === "JK1") return (count - 1) / count;
  return method === "bootstrap" ? 1 / (count - 1) : 1;
}

/** The factor of each replicate's squared deviation. */
export function replicateScales({ replicateScales: given }: Declared, count: number): Float64Array {
  if (Array.isArray(given)) return Float64Array.from(given);
  return new Float64Array(count).fill(given ?? 1);
}
