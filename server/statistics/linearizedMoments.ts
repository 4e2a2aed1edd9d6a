import type { CellTotals, ClusterTable } from "./clusterTotals.ts";
import { addCovariances, type Covariances, noCovariances, type Pairs } from "./componentCovariances.ts";
import type { ComponentPlan, Components, Term } from "./components.ts";
import type { DomainTotals } from "./domainTotals.ts";
import { isConstant, type Moments, type TargetPair } from "./moments.ts";
import type { VarianceLevel } from "./varianceLevels.ts";

/** Covariances of (R, W) of one target with (R, W) of another: R = Σ w (y − mean), W = Σ w. */
interface PairCovariance {
  rr: number;
  rw: number;
  wr: number;
  ww: number;
}

/**
 * Taylor-linearized variances. An estimate p varies by R/W, people by W, affected people by R + pW; what compares two
 * estimates follows from both and their covariance, so that shared PSUs and overlapping groups are counted exactly.
 *
 * @param tables One for each level.
 * @see Binder (1983), International Statistical Review 51: 279-292. Woodruff (1971), JASA 66: 411-414.
 */
export function linearizedMoments(input: {
  levels: readonly VarianceLevel[];
  tables: readonly ClusterTable[];
  totals: CellTotals;
  plan: ComponentPlan;
  domains: readonly DomainTotals[];
  contrasts: readonly TargetPair[];
  isBinary: boolean;
}): Moments {
  const { plan, domains, isBinary } = input;
  const pairs = collectPairs(plan, input.contrasts);
  const covariances = noCovariances(plan.components.count, pairs.list);
  input.levels.forEach((level, index) => {
    addCovariances(level, input.tables[index]!, plan.components, pairs.list, covariances);
  });
  const between = (of: number, from: number): PairCovariance => {
    const sum = { rr: 0, rw: 0, wr: 0, ww: 0 };
    for (const left of plan.terms[of]!) {
      const shiftLeft = plan.components.domains[left.component]!.centredMean - domains[of]!.centredMean;
      for (const right of plan.terms[from]!) {
        const shiftRight = plan.components.domains[right.component]!.centredMean - domains[from]!.centredMean;
        const sign = left.sign * right.sign;
        const { rr, rw, wr, ww } = componentCovariance(covariances, pairs, left, right);
        sum.rr += sign * (rr + shiftRight * rw + shiftLeft * wr + shiftLeft * shiftRight * ww);
        sum.rw += sign * (rw + shiftLeft * ww);
        sum.wr += sign * (wr + shiftRight * ww);
        sum.ww += sign * ww;
      }
    }
    return sum;
  };
  const estimateVariance = (target: number): number => {
    const domain = domains[target]!;
    return isConstant(domain, isBinary) ? 0 : Math.max(0, between(target, target).rr) / domain.people ** 2;
  };
  return {
    ofTarget: (target) => {
      const domain = domains[target]!;
      if (domain.estimate === null) return { estimate: null, people: null, affectedPeople: null };
      const { rr, rw, ww } = between(target, target);
      const people = dropRounding(ww, domain.people ** 2);
      const p = domain.estimate;
      const affected = isConstant(domain, isBinary) ? p * p * people : Math.max(0, rr + 2 * p * rw + p * p * ww);
      return { estimate: estimateVariance(target), people, affectedPeople: affected };
    },
    ofContrast: (of, from) => {
      const p = domains[of]!.estimate;
      const q = domains[from]!.estimate;
      if (p === null || q === null) return { difference: null, covariance: null, logRatio: null, logOddsRatio: null };
      const variance = estimateVariance(of);
      const other = estimateVariance(from);
      const covariance = variance === 0 || other === 0 ? 0 : between(of, from).rr / (domains[of]!.people * domains[from]!.people);
      const combine = (slopeP: number, slopeQ: number) => {
        const own = slopeP * slopeP * variance + slopeQ * slopeQ * other;
        return dropRounding(own - 2 * slopeP * slopeQ * covariance, own * 1e10);
      };
      const odds = (1 - p) * p > 0 && (1 - q) * q > 0;
      return {
        difference: combine(1, 1),
        covariance,
        logRatio: p > 0 && q > 0 ? combine(1 / p, 1 / q) : null,
        logOddsRatio: odds ? combine(1 / (p * (1 - p)), 1 / (q * (1 - q))) : null,
      };
    },
  };
}

/** A variance this small beside its scale is the rounding of a 0, such as that of a total the weights were fitted to. */
function dropRounding(variance: number, squaredScale: number): number {
  return variance <= 1e-25 * squaredScale ? 0 : variance;
}

interface CollectedPairs {
  list: Pairs;
  slotOf: Map<number, number>;
  components: Components;
}

/** The pairs of different components that the targets and contrasts need, each under the one with fewer respondents. */
function collectPairs(plan: ComponentPlan, contrasts: readonly TargetPair[]): CollectedPairs {
  const { components, terms } = plan;
  const others = Array.from({ length: components.count }, () => new Set<number>());
  const add = (left: readonly Term[], right: readonly Term[]) => {
    for (const { component: a } of left) {
      for (const { component: b } of right) {
        if (a === b) continue;
        const [first, second] = inOrder(components, a, b);
        others[first]!.add(second);
      }
    }
  };
  for (const own of terms) add(own, own);
  for (const { of, from } of contrasts) add(terms[of]!, terms[from]!);
  const start = new Uint32Array(components.count + 1);
  const slotOf = new Map<number, number>();
  const other: number[] = [];
  others.forEach((set, first) => {
    for (const second of set) slotOf.set(first * components.count + second, other.push(second) - 1);
    start[first + 1] = other.length;
  });
  return { list: { start, other: Uint32Array.from(other) }, slotOf, components };
}

function inOrder(components: Components, a: number, b: number): [number, number] {
  const difference = components.domains[a]!.respondents - components.domains[b]!.respondents;
  return difference < 0 || (difference === 0 && a < b) ? [a, b] : [b, a];
}

function componentCovariance({ own, cross }: Covariances, pairs: CollectedPairs, left: Term, right: Term): PairCovariance {
  const a = left.component;
  const b = right.component;
  if (a === b) return { rr: own[3 * a]!, rw: own[3 * a + 1]!, wr: own[3 * a + 1]!, ww: own[3 * a + 2]! };
  const [first, second] = inOrder(pairs.components, a, b);
  const at = 4 * (pairs.slotOf.get(first * pairs.components.count + second) ?? 0);
  const [rr, straight, crossed, ww] = [cross[at]!, cross[at + 1]!, cross[at + 2]!, cross[at + 3]!];
  return first === a ? { rr, rw: straight, wr: crossed, ww } : { rr, rw: crossed, wr: straight, ww };
}
