/** Answers questions. */
export interface Questions {
  close(): Promise<void>;
}
