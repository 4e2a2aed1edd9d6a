import { beforeAll, describe, expect, it } from "vitest";
import { isPlantedGroup } from "../../seeds/outcomes.ts";
import { WOMAN } from "../../seeds/person.ts";
import { makePopulation, trueMean, trueShare } from "../../seeds/population.ts";
import { createRandom } from "../../seeds/random.ts";
import { drawSample, WAVE_PLAN } from "../../seeds/sample.ts";
import { estimateTargets, type EstimateOptions, type TargetEstimate } from "../../server/statistics/estimate.ts";
import { flags, ofDrawn, sampleOf } from "./support/survey.ts";

/**
 * How often 95 % intervals hold the truth, over repeated samples of the demo's own plan from the demo's own population.
 *
 * Of 2,000 samples an interval that holds in 95 % of them misses the band of 93 to 97 % only beyond 4.1 standard errors
 * (√(0.95 · 0.05 / 2000) = 0.49 points), once in some 25,000 times; one that truly holds in 92 % lands inside the band with
 * a chance of 5 %, one in 91 % with less than 0.1 %. So the verdict tells right from wrong and doesn't hang on the seed.
 *
 * PSUs are drawn with replacement, as the estimator takes them. Everybody answers: what non-response adds is a matter of
 * the adjustment and not of the interval. A place that is drawn twice gives different adults, so that the intervals may
 * hold a little more often than asked.
 */
const SAMPLES = 2000;
const SEED = 95;
const LOWEST = 0.93;
const HIGHEST = 0.97;

/** Base cells: women, planted group (men), all other men. */
const CELLS = { women: 0, planted: 1, otherMen: 2 } as const;
const TARGETS = {
  everyone: [CELLS.women, CELLS.planted, CELLS.otherMen],
  women: [CELLS.women],
  men: [CELLS.planted, CELLS.otherMen],
  planted: [CELLS.planted],
  allOthers: [CELLS.women, CELLS.otherMen],
} as const;
const NAMES = ["everyone", "women", "men", "planted", "allOthers"] as const;
type Name = (typeof NAMES)[number];
const DIFFERENCES = [
  { of: "men", from: "women" },
  { of: "planted", from: "allOthers" },
] as const;

const options: EstimateOptions = { level: 95, interval: "korn-graubard", difference: "linear", isBinary: true };

const held = new Map<string, number>();
const shareHeld = (what: string) => held.get(what)! / SAMPLES;

function count(what: string, { low, high }: { low: number | null; high: number | null }, truth: number): void {
  const holds = low !== null && high !== null && low <= truth && truth <= high;
  held.set(what, (held.get(what) ?? 0) + (holds ? 1 : 0));
}

beforeAll(() => {
  const population = makePopulation("2025");
  const claims: Record<Name, Parameters<typeof trueShare>[1]> = {
    everyone: () => true,
    women: ({ sex }) => sex === WOMAN,
    men: ({ sex }) => sex !== WOMAN,
    planted: isPlantedGroup,
    allOthers: (person) => !isPlantedGroup(person),
  };
  const isWoman = flags(population, claims.women);
  const isPlanted = flags(population, isPlantedGroup);
  const smokes = flags(population, ({ smoking }) => smoking === 1);
  const shares = NAMES.map((name) => trueShare(population, ({ smoking }) => smoking === 1, claims[name]));
  const means = NAMES.map((name) => trueMean(population, ({ distress }) => distress, claims[name]));
  const targets = NAMES.map((name) => ({ cells: TARGETS[name] }));
  const contrasts = DIFFERENCES.map(({ of, from }) => ({ of: NAMES.indexOf(of), from: NAMES.indexOf(from) }));
  const random = createRandom(SEED);
  const countAll = (label: string, estimates: TargetEstimate[], truths: number[]) => {
    for (const [index, name] of NAMES.entries()) count(`${label} ${name}`, estimates[index]!, truths[index]!);
  };
  for (let turn = 0; turn < SAMPLES; turn += 1) {
    const drawn = drawSample(population, WAVE_PLAN, random);
    const sample = sampleOf(drawn);
    const cell = Int32Array.from(drawn.row, (row) =>
      isWoman[row] === 1 ? CELLS.women : isPlanted[row] === 1 ? CELLS.planted : CELLS.otherMen,
    );
    const answers = { cell, cells: 3, outcome: ofDrawn(drawn, smokes), isBinary: true };
    const exact = estimateTargets(sample, answers, targets, contrasts, options);
    const logit = estimateTargets(sample, answers, targets, [], { ...options, interval: "logit" });
    const scores = { cell, cells: 3, outcome: ofDrawn(drawn, population.values.distress), isBinary: false };
    const mean = estimateTargets(sample, scores, targets, [], { ...options, interval: "linear", isBinary: false });
    countAll("korn-graubard", exact.targets, shares);
    countAll("logit", logit.targets, shares);
    countAll("mean", mean.targets, means);
    for (const [index, { of, from }] of contrasts.entries()) {
      count(`difference ${index}`, exact.contrasts[index]!, shares[of]! - shares[from]!);
    }
  }
}, 120_000);

describe("95 % intervals over repeated samples of the demo's population", () => {
  it.each(NAMES)("Korn–Graubard intervals of daily smoking hold the truth: %s", (name) => {
    expect(shareHeld(`korn-graubard ${name}`)).toBeGreaterThan(LOWEST);
    expect(shareHeld(`korn-graubard ${name}`)).toBeLessThan(HIGHEST);
  });

  it.each(NAMES)("logit intervals of daily smoking hold the truth: %s", (name) => {
    expect(shareHeld(`logit ${name}`)).toBeGreaterThan(LOWEST);
    expect(shareHeld(`logit ${name}`)).toBeLessThan(HIGHEST);
  });

  it.each(NAMES)("intervals of the mean distress score hold the truth: %s", (name) => {
    expect(shareHeld(`mean ${name}`)).toBeGreaterThan(LOWEST);
    expect(shareHeld(`mean ${name}`)).toBeLessThan(HIGHEST);
  });

  it.each(DIFFERENCES.map(({ of, from }, index) => ({ index, of, from })))(
    "linear intervals of the difference hold the truth: $of against $from",
    ({ index }) => {
      expect(shareHeld(`difference ${index}`)).toBeGreaterThan(LOWEST);
      expect(shareHeld(`difference ${index}`)).toBeLessThan(HIGHEST);
    },
  );
});
