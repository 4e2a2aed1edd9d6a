import { ticks } from "d3-array";
import { Band } from "../../../shared/contracts/questions.ts";

type Ends = readonly [number | null, number | null];

/** What a band is called where nobody named it. */
export function bandLabel([from, to]: Ends): string {
  if (from === null) return `up to ${to ?? ""}`;
  if (to === null) return `${from} and over`;
  return from === to ? String(from) : `${from}–${to}`;
}

export const bandOf = (from: number | null, to: number | null): Band => [from, to, bandLabel([from, to])];

/** Bands as a person would type them. */
export function bandsText(bands: readonly Band[]): string {
  return bands
    .map(([from, to, label]) => {
      const ends = from === null ? `up to ${to ?? ""}` : to === null ? `${from}+` : from === to ? String(from) : `${from}–${to}`;
      return label === bandLabel([from, to]) ? ends : `${label}: ${ends}`;
    })
    .join(", ");
}

const NUMBER = String.raw`[-−]?\d+(?:\.\d+)?`;
const CLOSED = new RegExp(`^(${NUMBER})\\s*(?:–|—|-|to)\\s*(${NUMBER})$`, "u");
const FROM = new RegExp(`^(?:(?:≥|>=|from|at least)\\s*(${NUMBER})|(${NUMBER})\\s*(?:\\+|and over|and above|or more))$`, "u");
const UP_TO = new RegExp(`^(?:≤|<=|up to|at most)\\s*(${NUMBER})$`, "u");
const SINGLE = new RegExp(`^(${NUMBER})$`, "u");
const read = (text: string | undefined) => Number((text ?? "").replace("−", "-"));

function readEnds(text: string): Ends | null {
  const closed = CLOSED.exec(text);
  if (closed) return [read(closed[1]), read(closed[2])];
  const from = FROM.exec(text);
  if (from) return [read(from[1] ?? from[2]), null];
  const upTo = UP_TO.exec(text);
  if (upTo) return [null, read(upTo[1])];
  const single = SINGLE.exec(text);
  return single ? [read(single[1]), read(single[1])] : null;
}

/** Bands from typed text such as “18–24, 25–34, 65+” or “young: 18–24”; or what is wrong with it, and where. */
export function readBands(text: string): { bands: Band[] } | { problem: string } {
  const parts = text.split(/[,;\n]/u).map((part) => part.trim());
  const bands: Band[] = [];
  for (const part of parts.filter((part) => part !== "")) {
    const colon = part.lastIndexOf(":");
    const ends = readEnds(part.slice(colon + 1).trim());
    if (ends === null) return { problem: `“${part}” isn't a band. Write two ends such as 18–24, or one open end such as 65+.` };
    const label = colon > 0 ? part.slice(0, colon).trim() : bandLabel(ends);
    const band = Band.safeParse([...ends, label]);
    if (!band.success) return { problem: `“${part}”: ${band.error.issues[0]?.message ?? "isn't a band."}` };
    bands.push(band.data);
  }
  if (bands.length === 0) return { problem: "Write at least one band, such as 18–24, 25–34, 65+." };
  if (bands.length > 40) return { problem: "A table takes at most 40 bands of one variable." };
  return { bands };
}

/** What is worth knowing about bands that can be used as they are: values between them, or in two of them. */
export function bandsRemark(bands: readonly Band[], isWhole: boolean): string | null {
  const step = isWhole ? 1 : 0;
  for (const [index, [, to]] of bands.slice(0, -1).entries()) {
    const next = bands[index + 1]?.[0] ?? null;
    if (to === null || next === null) continue;
    if (next > to + step) return `Values between ${to} and ${next} belong to no band and are left out.`;
    if (next < to || (isWhole && next === to)) return `A value in two bands counts in the first of them.`;
  }
  return null;
}

function equalBands(starts: readonly number[]): Band[] {
  return starts.map((start, index) => {
    const next = starts[index + 1];
    return bandOf(start, next === undefined ? null : next - 1);
  });
}

const range = (from: number, to: number, step: number) =>
  Array.from({ length: Math.floor((to - from) / step) + 1 }, (_, index) => from + index * step);

const AGE_PRESETS: readonly { name: string; bands: Band[] }[] = [
  { name: "Ten years", bands: equalBands([18, ...range(25, 75, 10)]) },
  { name: "Five years", bands: equalBands([18, ...range(20, 80, 5)]) },
  { name: "Three ages", bands: equalBands([18, 45, 65]) },
];

function roundBands(minimum: number, maximum: number, isWhole: boolean): Band[] {
  const cuts = ticks(minimum, maximum, 5).filter((cut) => cut > minimum && cut < maximum && (!isWhole || Number.isInteger(cut)));
  const back = isWhole ? 1 : 0;
  return [null, ...cuts].map((start, index) => {
    const next = cuts[index];
    return bandOf(start, next === undefined ? null : next - back);
  });
}

export interface BandedVariable {
  name: string;
  label: string;
  isWhole: boolean;
  minimum: number | null;
  maximum: number | null;
}

/** Ready-made bands that fit a variable: customary ages, or round cuts where its ends are known. */
export function bandPresets({ name, label, isWhole, minimum, maximum }: BandedVariable): { name: string; bands: Band[] }[] {
  if (/\bage\b/iu.test(`${name.replaceAll("_", " ")} ${label}`)) return [...AGE_PRESETS];
  if (minimum !== null && maximum !== null && maximum > minimum) {
    const bands = roundBands(minimum, maximum, isWhole);
    if (bands.length > 1) return [{ name: "Round cuts", bands }];
  }
  return [
    { name: "None, some", bands: [bandOf(0, 0), bandOf(1, null)] },
    { name: "0, 1–2, 3–5, 6 and over", bands: [bandOf(0, 0), bandOf(1, 2), bandOf(3, 5), bandOf(6, null)] },
    { name: "Tens", bands: [bandOf(null, 9), bandOf(10, 19), bandOf(20, 29), bandOf(30, null)] },
  ];
}
