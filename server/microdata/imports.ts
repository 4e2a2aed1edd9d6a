/** Brings in releases. */
export interface Imports {
  /** Ends workers; running imports are cancelled. */
  close(): Promise<void>;
}
