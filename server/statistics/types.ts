/**
 * A release's respondents in layout order: by stratum, then PSU, so that each PSU is one run of rows.
 * Typed arrays may lie over SharedArrayBuffers.
 */
export interface Sample {
  /** Full-sample weight of each respondent, ≥ 0. Weight 0 keeps its PSU in the design and is in no cell. */
  weight: Float64Array;
  /** First row of each PSU, and one past the last row: PSU i is rows psuStart[i] to psuStart[i + 1] − 1. */
  psuStart: Uint32Array;
  /** First PSU of each stratum, and one past the last PSU. */
  stratumStart: Uint32Array;
  /** What a stratum with a single PSU adds to a variance; a release declares it in its design. */
  lonely: "centred" | "certainty" | "average" | "refuse";
  /** Population number of first-stage units of each stratum (n_h/N_h is the sampling fraction); null: drawn with replacement. */
  stratumPopulation: Float64Array | null;
  /** Second stage, where both stages' sizes are declared; null otherwise. */
  secondStage: SecondStage | null;
  /** Replicate weights instead of linearisation; strata and PSUs are then not used for variances. */
  replicates: Replicates | null;
}

/** Second-stage units as runs of rows inside each PSU. */
export interface SecondStage {
  /** First row of each second-stage unit, and one past the last row. */
  unitStart: Uint32Array;
  /** First second-stage unit of each PSU, and one past the last unit. */
  psuUnitStart: Uint32Array;
  /** Population number of second-stage units of each PSU. */
  psuPopulation: Float64Array;
}

/** V = scale · Σ replicateScales[r] (θ_r − θ_0)². */
export interface Replicates {
  /** One array of weights for each replicate, rows in layout order. */
  weights: Float64Array[];
  scale: number;
  replicateScales: Float64Array;
  /** Deviations from the full-sample estimate, else from the replicates' mean. */
  mse: boolean;
  degreesOfFreedom: number;
}

/** Which base cell each respondent falls in, and the outcome. Base cells are disjoint. */
export interface Assignment {
  /** Base cell of each row, or −1 for a row outside the population or with a missing outcome. */
  cell: Int32Array;
  /** Number of base cells. */
  cells: number;
  /** The outcome where `cell` ≥ 0; elsewhere not read. */
  outcome: Float64Array | Uint8Array;
  /** Whether the outcome is only 0 and 1. */
  isBinary: boolean;
}
