import { randomGamma, randomNormal, randomPoisson } from "d3-random";
import { uniformFloat64 } from "pure-rand/distribution/uniformFloat64";
import { xoroshiro128plus } from "pure-rand/generator/xoroshiro128plus";

/** Random draws that are the same on every machine for the same seed. */
export interface Random {
  /** In [0, 1). */
  uniform(): number;
  /** Standard normal. */
  normal(): number;
  /** Standard logistic. */
  logistic(): number;
  /** Gamma of mean 1. */
  gamma(shape: number): number;
  poisson(mean: number): number;
  /** A whole number from 0 to `count` − 1. */
  below(count: number): number;
  /** Position of one of `shares`, which add to 1. */
  pick(shares: readonly number[]): number;
}

/** A stream of its own for each seed and purpose. */
export function createRandom(seed: number): Random {
  const generator = xoroshiro128plus(seed);
  const uniform = () => uniformFloat64(generator);
  const normal = randomNormal.source(uniform)(0, 1);
  const gammaOf = randomGamma.source(uniform);
  const poissonOf = randomPoisson.source(uniform);
  return {
    uniform,
    normal,
    logistic: () => {
      const u = uniform() || 2 ** -53;
      return Math.log(u / (1 - u));
    },
    gamma: (shape) => gammaOf(shape, 1 / shape)(),
    poisson: (mean) => poissonOf(mean)(),
    below: (count) => Math.floor(uniform() * count),
    pick: (shares) => {
      let left = uniform();
      for (let position = 0; position < shares.length - 1; position += 1) {
        left -= shares[position]!;
        if (left < 0) return position;
      }
      return shares.length - 1;
    },
  };
}
