import { describe, expect, it } from "vitest";
import { adjust } from "../../server/statistics/adjusted.ts";
import { association } from "../../server/statistics/association.ts";
import { attributable } from "../../server/statistics/attributable.ts";
import { estimateTargets } from "../../server/statistics/estimate.ts";
import { inequality } from "../../server/statistics/inequality.ts";
import { standardise } from "../../server/statistics/standardise.ts";
import { trend } from "../../server/statistics/trend.ts";
import type { Assignment, Sample } from "../../server/statistics/types.ts";
import { buildSample, type Row } from "./support/buildSample.ts";
import { expectClose } from "./support/close.ts";

const GROUPS = 3;
const BANDS = 2;
const PSUS = 20;
const NUDGE = 1e-5;
const OPTIONS = { level: 95, interval: "linear", difference: "linear", isBinary: true } as const;

/** Irregular but fixed: weights from 1 to 40, two to nine respondents a PSU, groups and bands unevenly spread. */
const rows = Array.from({ length: PSUS }, (_, psu) =>
  Array.from({ length: 2 + ((psu * 5) % 8) }, (__, member): Row & { group: number; band: number } => {
    const draw = (psu * 37 + member * 101 + psu * member * 13) % 97;
    const group = (draw + member) % GROUPS;
    const band = draw % 7 < 4 ? 0 : 1;
    const y = (draw * 31 + psu) % 10 < 3 + 2 * group + band ? 1 : 0;
    return { psu: String(psu).padStart(2, "0"), weight: 1 + (draw % 40), cell: group * BANDS + band, y, group, band };
  }),
).flat();

/** The sample by linearisation, and by replicates that each make one PSU's weights heavier by a hundred-thousandth. */
function bothWays(cellOf: (row: (typeof rows)[number]) => number) {
  const given = rows.map((row): Row => ({ ...row, cell: cellOf(row) }));
  const linear = buildSample(given);
  const weights = Array.from({ length: PSUS }, (_, psu) =>
    linear.sample.weight.map((weight, row) =>
      row >= linear.sample.psuStart[psu]! && row < linear.sample.psuStart[psu + 1]! ? weight * (1 + NUDGE) : weight,
    ),
  );
  const replicates = {
    weights,
    scale: PSUS / (PSUS - 1) / NUDGE ** 2,
    replicateScales: new Float64Array(PSUS).fill(1),
    mse: true,
    degreesOfFreedom: PSUS - 1,
  };
  return { ...linear, nudged: { ...linear.sample, replicates } };
}

const groupsAndBands = bothWays(({ group, band }) => group * BANDS + band);
const groupsOnly = bothWays(({ group }) => group);
const groupTargets = [0, 1, 2].map((cell) => ({ cells: [cell] }));

type Way = typeof groupsOnly;

/** Standard errors of everything that a function of cells gives. */
const functions: [string, Way, (sample: Sample, assignment: Assignment, way: Way) => (number | null)[]][] = [
  [
    "shares and their comparisons",
    groupsOnly,
    (sample, assignment) => {
      const result = estimateTargets(sample, assignment, [...groupTargets, { cells: [0, 2] }], [{ of: 0, from: 3 }], OPTIONS);
      const [contrast] = result.contrasts;
      return [...result.targets.map(({ se }) => se), contrast!.se, contrast!.logRatioSe, contrast!.logOddsRatioSe];
    },
  ],
  [
    "standardised shares, bands as unions",
    groupsAndBands,
    (sample, assignment) => {
      const groups = [
        [{ cells: [0, 2] }, { cells: [1, 3] }],
        [{ cells: [4] }, { cells: [5] }],
      ];
      const result = standardise(sample, assignment, groups, [2, 1], [{ of: 0, from: 1 }], OPTIONS);
      const [contrast] = result.contrasts;
      return [...result.groups.map(({ se }) => se), contrast!.se, contrast!.logRatioSe, contrast!.logOddsRatioSe];
    },
  ],
  [
    "straight lines",
    groupsOnly,
    (sample, assignment) =>
      (["linear", "logistic"] as const).map(
        (link) => trend(sample, assignment, groupTargets, [1, 2, 5], { link, level: 95 }).slopeSe,
      ),
  ],
  [
    "adjusted shares and coefficients",
    groupsOnly,
    (sample, assignment, way) => {
      const codes = Int32Array.from(way.order, (index) => rows[index]!.band);
      const model = adjust(sample, assignment, [{ codes, levels: BANDS }], [{ of: 2, from: 0 }], OPTIONS);
      const [contrast] = model.contrasts;
      return [...model.groups.map(({ se }) => se), ...model.coefficients.map(({ se }) => se), contrast!.se, contrast!.logRatioSe];
    },
  ],
  [
    "inequality",
    groupsOnly,
    (sample, assignment) => {
      const indexes = inequality(sample, assignment, [0, 1, 2], 95);
      return [
        indexes.slopeIndex,
        indexes.relativeIndex,
        indexes.logisticSlopeIndex,
        indexes.logisticRelativeIndex,
        indexes.absoluteConcentration,
        indexes.relativeConcentration,
      ].map(({ se }) => se);
    },
  ],
  [
    "attributable risks",
    groupsOnly,
    (sample, assignment) => {
      const { risk, fraction } = attributable(sample, assignment, 0, 95);
      return [risk.se, fraction.se];
    },
  ],
  [
    "a whole table's design effects",
    groupsOnly,
    (sample, assignment) => {
      const test = association(sample, assignment);
      return [test!.f, test!.numeratorDf];
    },
  ],
];

describe("linearised errors are those of the smallest changes in weights", () => {
  it.each(functions)("%s", (_, way, errors) => {
    const expected = errors(way.nudged, way.assignment, way);
    const actual = errors(way.sample, way.assignment, way);
    expect(actual.length).toBe(expected.length);
    expected.forEach((error, index) => {
      expect(error).toBeGreaterThan(0);
      // A step of 1e-5 one way is off by about as much.
      expectClose(actual[index], error!, 1e-4, `error ${index}`);
    });
  });
});
