import { type CellSums, type Influence, noInfluence } from "./cellFunction.ts";
import { SeparationError, SingularFitError } from "./errors.ts";
import { invertSymmetric, multiply } from "./matrices.ts";

/** How an outcome depends on a linear predictor. */
export type Link = "linear" | "logistic";

/** Explanatory values of each base cell; everyone in a cell has the same. `terms` values a cell, cell by cell. */
export interface CellDesign {
  terms: number;
  values: Float64Array;
}

/** A weighted fit over cells. */
export interface Fit {
  coefficients: Float64Array;
  /** Fitted mean of each cell. */
  fitted: Float64Array;
  /** d fitted / d linear predictor of each cell. */
  slope: Float64Array;
  /** Inverse of the weighted information, row by row. */
  inverse: Float64Array;
}

const MOST_STEPS = 60;
/** Linear predictors this far apart from even odds mean fitted shares of 1e-9: the fit is running away. */
const RUNAWAY = 20;

/**
 * Weighted maximum likelihood by iteratively reweighted least squares; one step for a linear model. Rows with the same
 * explanatory values share a cell, which changes no coefficient and no influence.
 *
 * @throws {SeparationError} Terms that predict a 0/1 outcome perfectly: no finite fit exists.
 * @throws {SingularFitError} Terms that repeat one another, or nobody to fit.
 * @see McCullagh & Nelder (1989), Generalized Linear Models, 2nd edition, section 2.5.
 */
export function fitCells(sums: CellSums, design: CellDesign, link: Link): Fit {
  const { terms, values } = design;
  const cells = [...sums.people.keys()].filter((cell) => sums.people[cell]! > 0);
  const people = cells.reduce((sum, cell) => sum + sums.people[cell]!, 0);
  if (!(people > 0)) throw new SingularFitError("Nobody has every value that the model needs");
  let coefficients: Float64Array = new Float64Array(terms);
  let deviance = Infinity;
  for (let step = 0; step < MOST_STEPS; step++) {
    const { fitted, slope } = predict(sums, design, coefficients, link);
    const information = new Float64Array(terms * terms);
    const score = new Float64Array(terms);
    for (const cell of cells) {
      const weight = (sums.people[cell]! / people) * slope[cell]!;
      const residual = (sums.people[cell]! / people) * (sums.mean[cell]! - fitted[cell]!);
      for (let row = 0; row < terms; row++) {
        const x = values[cell * terms + row]!;
        if (x === 0) continue;
        score[row]! += x * residual;
        for (let column = 0; column <= row; column++) {
          information[row * terms + column]! += weight * x * values[cell * terms + column]!;
        }
      }
    }
    const inverse = invertSymmetric(information, terms);
    if (inverse === null) {
      if (link === "logistic" && step > 0) throw separated();
      throw new SingularFitError("The model's terms repeat one another: some group occurs with only one value of another");
    }
    const change = multiply(inverse, score);
    const isSettled = change.every((value, term) => Math.abs(value) <= 1e-11 * Math.max(1, Math.abs(coefficients[term]!)));
    if (isSettled) {
      if (link === "logistic" && hasRunAway(cells, design, coefficients)) throw separated();
      return { coefficients, fitted, slope, inverse: inverse.map((value) => value / people) };
    }
    ({ coefficients, deviance } = improve(sums, design, link, cells, coefficients, change, deviance));
  }
  if (link === "logistic") throw separated();
  throw new SingularFitError("The fit does not settle");
}

/** Influences of the coefficients: A⁻¹ x (w (y − fitted)), which gives the sandwich variance. */
export function coefficientInfluences(sums: CellSums, design: CellDesign, fit: Fit): Influence[] {
  const { terms, values } = design;
  const cells = sums.people.length;
  return Array.from({ length: terms }, (_, term) => {
    const influence = noInfluence(cells);
    for (let cell = 0; cell < cells; cell++) {
      if (!(sums.people[cell]! > 0)) continue;
      let pull = 0;
      for (let other = 0; other < terms; other++) pull += fit.inverse[term * terms + other]! * values[cell * terms + other]!;
      influence.onResidual[cell] = pull;
      influence.onPeople[cell] = pull * (sums.mean[cell]! - fit.fitted[cell]!);
    }
    return influence;
  });
}

/** Mean and its slope for a linear predictor. */
export function respond(predictor: number, link: Link): { mean: number; slope: number } {
  if (link === "linear") return { mean: predictor, slope: 1 };
  const mean = 1 / (1 + Math.exp(-predictor));
  return { mean, slope: mean / (1 + Math.exp(predictor)) };
}

function linearPredictor({ terms, values }: CellDesign, coefficients: Float64Array, cell: number): number {
  let sum = 0;
  for (let term = 0; term < terms; term++) sum += coefficients[term]! * values[cell * terms + term]!;
  return sum;
}

function predict(sums: CellSums, design: CellDesign, coefficients: Float64Array, link: Link) {
  const fitted = new Float64Array(sums.people.length);
  const slope = new Float64Array(sums.people.length);
  for (let cell = 0; cell < fitted.length; cell++) {
    const { mean, slope: rise } = respond(linearPredictor(design, coefficients, cell), link);
    fitted[cell] = mean;
    slope[cell] = rise;
  }
  return { fitted, slope };
}

/** Takes the step, halved until the logistic deviance no longer rises. */
function improve(
  sums: CellSums,
  design: CellDesign,
  link: Link,
  cells: readonly number[],
  from: Float64Array,
  change: Float64Array,
  deviance: number,
): { coefficients: Float64Array; deviance: number } {
  for (let size = 1; ; size /= 2) {
    const coefficients = from.map((value, term) => value + size * change[term]!);
    if (link === "linear") return { coefficients, deviance };
    const reached = logisticDeviance(sums, design, cells, coefficients);
    if (reached <= deviance * (1 + 1e-12) || size < 1e-6) return { coefficients, deviance: reached };
  }
}

function logisticDeviance(sums: CellSums, design: CellDesign, cells: readonly number[], coefficients: Float64Array): number {
  let sum = 0;
  for (const cell of cells) {
    const predictor = linearPredictor(design, coefficients, cell);
    const softplus = predictor > 0 ? predictor + Math.log1p(Math.exp(-predictor)) : Math.log1p(Math.exp(predictor));
    sum += sums.people[cell]! * (softplus - sums.mean[cell]! * predictor);
  }
  return sum;
}

function hasRunAway(cells: readonly number[], design: CellDesign, coefficients: Float64Array): boolean {
  return cells.some((cell) => Math.abs(linearPredictor(design, coefficients, cell)) > RUNAWAY);
}

function separated(): SeparationError {
  return new SeparationError("Some group has only one outcome, so that its part of the model runs to infinity");
}
