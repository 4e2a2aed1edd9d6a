import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { type ContrastRequest, estimateTargets, type Target } from "../../server/statistics/estimate.ts";
import { buildSample, type BuildOptions, type Row } from "./support/buildSample.ts";
import { expectClose } from "./support/close.ts";

// The same samples in every run: a failure comes back. Failing samples are small as they are.
fc.configureGlobal({ seed: 20_090, endOnFailure: true, numRuns: 200 });

const CELLS = 3;
const OPTIONS = { level: 95, interval: "korn-graubard", difference: "linear", isBinary: true } as const;

/** Irregular samples: 2 to 4 strata of 2 to 4 PSUs, weights over three orders of magnitude, some 0, some outside every cell. */
const anyRows = (outcome: fc.Arbitrary<number>) =>
  fc
    .array(fc.integer({ min: 2, max: 4 }), { minLength: 2, maxLength: 4 })
    .chain((psus) => {
      const places = psus.flatMap((count, stratum) => Array.from({ length: count }, (_, psu) => ({ stratum, psu })));
      const respondents = fc.array(
        fc.record({
          weight: fc.oneof(
            { weight: 9, arbitrary: fc.double({ min: 1, max: 1000, noNaN: true }) },
            { weight: 1, arbitrary: fc.constant(0) },
          ),
          cell: fc.option(fc.integer({ min: 0, max: CELLS - 1 }), { freq: 8 }),
          y: outcome,
        }),
        { minLength: 1, maxLength: 6 },
      );
      return fc.tuple(...places.map((place) => respondents.map((rows) => rows.map((row): Row => ({ ...place, ...row })))));
    })
    .map((groups) => groups.flat());
const shares = anyRows(fc.integer({ min: 0, max: 1 }));
const numbers = anyRows(fc.integer({ min: -5000, max: 5000 }).map((hundredths) => hundredths / 100));

const TARGETS: Target[] = [{ cells: [0] }, { cells: [1] }, { cells: [2] }, { cells: [1, 2] }, { cells: [0, 1, 2] }];
const CONTRASTS: ContrastRequest[] = [
  { of: 0, from: 1 },
  { of: 0, from: 3 },
  { of: 0, from: 4 },
];

function estimate(rows: readonly Row[], isBinary: boolean, options: BuildOptions = {}, targets = TARGETS, contrasts = CONTRASTS) {
  const { sample, assignment } = buildSample(rows, { cells: CELLS, ...options, isBinary });
  return estimateTargets(sample, assignment, targets, contrasts, { ...OPTIONS, isBinary });
}
type Result = ReturnType<typeof estimate>;

/** Every number of a result in one list, those that count people apart. */
const figures = ({ targets, contrasts }: Result) => [
  ...targets.flatMap(({ estimate: p, se, low, high, deff, df, kish }) => [p, se, low, high, deff, df, kish]),
  ...contrasts.flatMap(({ difference, se, low, high, p, ratio }) => [difference, se, low, high, p, ratio]),
];
const peopleOf = ({ targets }: Result) =>
  targets.flatMap(({ people, peopleSe, affectedPeople, affectedPeopleSe }) => [
    people,
    peopleSe,
    affectedPeople,
    affectedPeopleSe,
  ]);

function expectSame(actual: (number | null)[], expected: (number | null)[], tolerance: number, scale: number): void {
  expect(actual.length).toBe(expected.length);
  expected.forEach((value, index) => {
    if (value === null) expect(actual[index]).toBeNull();
    else expectClose(actual[index], value, tolerance, `figure ${index}`, scale);
  });
}

describe("whatever the sample", () => {
  it("rows in another order change nothing", () => {
    fc.assert(
      fc.property(shares, fc.infiniteStream(fc.double({ min: 0, max: 1, noNaN: true })), (rows, keys) => {
        const shuffled = rows
          .map((row) => ({ row, key: keys.next().value as number }))
          .sort((a, b) => a.key - b.key)
          .map(({ row }) => row);
        expectSame(figures(estimate(shuffled, true)), figures(estimate(rows, true)), 1e-10, 1e-3);
      }),
    );
  });

  it("weights times a million change people in proportion and nothing else", () => {
    fc.assert(
      fc.property(shares, (rows) => {
        const scaled = estimate(
          rows.map((row) => ({ ...row, weight: row.weight! * 1e6 })),
          true,
        );
        const plain = estimate(rows, true);
        expectSame(figures(scaled), figures(plain), 1e-9, 1e-3);
        expectSame(
          peopleOf(scaled),
          peopleOf(plain).map((value) => (value === null ? null : value * 1e6)),
          1e-9,
          1,
        );
      }),
    );
  });

  it("a million added to every outcome is added to the means and to nothing else", () => {
    fc.assert(
      fc.property(numbers, (rows) => {
        const shifted = estimate(
          rows.map((row) => ({ ...row, y: row.y! + 1e6 })),
          false,
        );
        const plain = estimate(rows, false);
        shifted.targets.forEach((target, index) => {
          const other = plain.targets[index]!;
          if (other.estimate === null) return;
          expectClose(target.estimate! - 1e6, other.estimate, 1e-9, "mean", 1);
          // Outcomes near a million carry 1e-10 of rounding each before the engine sees them.
          expectClose(target.se, other.se!, 1e-8, "se", 1);
        });
        shifted.contrasts.forEach((contrast, index) => {
          const other = plain.contrasts[index]!;
          if (other.difference !== null) expectClose(contrast.difference, other.difference, 1e-8, "difference", 1);
          if (other.se !== null) expectClose(contrast.se, other.se, 1e-8, "se of the difference", 1);
        });
      }),
    );
  });

  it("a category split in two and joined again is the same category", () => {
    fc.assert(
      fc.property(shares, (rows) => {
        const split = rows.map((row, index): Row => (row.cell === 2 && index % 2 === 0 ? { ...row, cell: 3 } : row));
        const joined = TARGETS.map(({ cells }) => ({ cells: [...cells].includes(2) ? [...cells, 3] : cells }));
        const actual = estimate(split, true, { cells: 4 }, joined);
        expectSame(figures(actual), figures(estimate(rows, true)), 1e-10, 1e-3);
      }),
    );
  });

  it("differences' variances and the covariance matrix agree, which is symmetric and without a negative direction", () => {
    const pairs = [0, 1, 2].flatMap((of) => [0, 1, 2].flatMap((from) => (of === from ? [] : [{ of, from }])));
    fc.assert(
      fc.property(shares, fc.array(fc.integer({ min: -3, max: 3 }), { minLength: 3, maxLength: 3 }), (rows, direction) => {
        const { targets, contrasts } = estimate(rows, true, {}, TARGETS.slice(0, 3), pairs);
        if (targets.some(({ estimate: p }) => p === null)) return;
        const covariance = (of: number, from: number) =>
          of === from
            ? targets[of]!.se! ** 2
            : contrasts[pairs.findIndex((pair) => pair.of === of && pair.from === from)]!.covariance!;
        pairs.forEach(({ of, from }, index) => {
          expectClose(covariance(of, from), covariance(from, of), 1e-12, "symmetry", 1e-3);
          const variance = covariance(of, of) + covariance(from, from) - 2 * covariance(of, from);
          expectClose(contrasts[index]!.se! ** 2, variance, 1e-9, "variance of a difference", 1e-3);
        });
        const form = direction.reduce(
          (sum, left, of) => sum + direction.reduce((inner, right, from) => inner + left * right * covariance(of, from), 0),
          0,
        );
        expect(form).toBeGreaterThan(-1e-14);
      }),
    );
  });

  it("no figure is ever NaN or infinite", () => {
    const anyOutcome = fc.oneof(shares, numbers);
    const lonely = fc.constantFrom("centred", "certainty", "average");
    fc.assert(
      fc.property(anyOutcome, lonely, fc.nat(20), (rows, rule, kept) => {
        const few = rows.slice(0, 1 + kept);
        const isBinary = few.every(({ y }) => y === 0 || y === 1);
        const result = estimate(few, isBinary, { lonely: rule });
        for (const part of [...result.targets, ...result.contrasts])
          for (const [name, value] of Object.entries(part))
            if (typeof value === "number") expect(Number.isFinite(value), name).toBe(true);
      }),
    );
  });
});

describe("what textbooks prove", () => {
  it("equal weights without strata or PSUs give the formulas of a simple random sample", () => {
    const outcomes = fc.array(fc.double({ min: -10, max: 10, noNaN: true }), { minLength: 3, maxLength: 40 });
    fc.assert(
      fc.property(outcomes, fc.double({ min: 0.1, max: 1e6, noNaN: true }), (values, weight) => {
        const n = values.length;
        const mean = values.reduce((sum, y) => sum + y, 0) / n;
        const squares = values.reduce((sum, y) => sum + (y - mean) ** 2, 0);
        const [target] = estimate(
          values.map((y) => ({ y, weight, cell: 0 })),
          false,
        ).targets;
        expectClose(target!.estimate, mean, 1e-9, "mean", 1);
        expectClose(target!.se, Math.sqrt(squares / (n - 1) / n), 1e-9, "standard error", 1e-3);
        expect(target!.df).toBe(n - 1);
        expectClose(target!.kish, 1, 1e-12, "weights' effect");
        if (squares > 1e-3) expectClose(target!.deff, 1, 1e-9, "design effect");
      }),
    );
  });

  it("replicates that leave out one PSU in turn give a total's linearised error exactly", () => {
    fc.assert(
      fc.property(numbers, (rows) => {
        const psuOf = (row: Row) => `${row.stratum}/${row.psu}`;
        const psus = [...new Set(rows.map(psuOf))];
        const inStratum = (stratum: Row["stratum"]) => psus.filter((psu) => psu.startsWith(`${stratum}/`)).length;
        const withReplicates = rows.map((row): Row => {
          const size = inStratum(row.stratum);
          const factor = (psu: string) => (psu === psuOf(row) ? 0 : psu.startsWith(`${row.stratum}/`) ? size / (size - 1) : 1);
          return { ...row, replicates: psus.map((psu) => row.weight! * factor(psu)) };
        });
        const replicates = {
          scale: 1,
          replicateScales: Float64Array.from(psus, (psu) => 1 - 1 / inStratum(psu.split("/")[0])),
          mse: true,
          degreesOfFreedom: psus.length - 1,
        };
        const jackknife = estimate(withReplicates, false, { replicates });
        const linearised = estimate(rows, false);
        linearised.targets.forEach((target, index) => {
          if (target.people === 0) return;
          const other = jackknife.targets[index]!;
          expectClose(other.peopleSe, target.peopleSe!, 1e-9, "people", target.people);
          expectClose(other.affectedPeopleSe, target.affectedPeopleSe!, 1e-9, "total", 50 * target.people);
        });
      }),
    );
  });
});
