/** The design cannot give the variance that was asked for. `code` says why in a word; the message names where. */
export class DesignError extends Error {
  override readonly name = "DesignError";
  constructor(
    readonly code: "lonely-psu" | "bad-weight" | "bad-population" | "bad-replicates" | "mixed-waves",
    message: string,
  ) {
    super(message);
  }
}

/** A model's fit runs to infinity because some combination of its terms predicts the outcome perfectly. */
export class SeparationError extends Error {
  override readonly name = "SeparationError";
}

/** A model's terms repeat one another, or there is nothing to fit: no single best fit exists. */
export class SingularFitError extends Error {
  override readonly name = "SingularFitError";
}

/** A value asked of a distribution lies outside its domain; a mistake of the caller. */
export class DomainError extends RangeError {
  override readonly name = "DomainError";
}
