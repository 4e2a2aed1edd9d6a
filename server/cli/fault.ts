/** Exit codes of the commands, one for each thing a person can mend; documented in README.md. */
export const EXIT = {
  fault: 1,
  settings: 2,
  portInUse: 3,
  missingProgram: 4,
  databaseWontStart: 5,
  dataOfAnotherVersion: 6,
  databaseUnreachable: 7,
  dataInUse: 8,
} as const;

/** A failure of a command: what happened and what to do, printed without a stack. */
export class CommandFault extends Error {
  readonly exitCode: number;
  constructor(kind: keyof typeof EXIT, message: string) {
    super(message);
    this.name = "CommandFault";
    this.exitCode = EXIT[kind];
  }
}
