import { CommandFault, EXIT } from "./fault.ts";

/** Runs a command's work; a fault that a person can mend is printed as a message, with its exit code. */
export async function runCommand(work: () => Promise<void>): Promise<void> {
  try {
    await work();
  } catch (error) {
    if (error instanceof CommandFault) {
      console.error(error.message);
      process.exit(error.exitCode);
    }
    console.error(error);
    process.exit(EXIT.fault);
  }
}

/** Runs `close` once, at the first Ctrl-C or SIGTERM, and ends the process; a second signal ends it at once. */
export function closeOnSignal(close: () => Promise<void>): void {
  let isClosing = false;
  const handle = () => {
    if (isClosing) process.exit(EXIT.fault);
    isClosing = true;
    close().then(
      () => process.exit(0),
      (error: unknown) => {
        console.error(error);
        process.exit(EXIT.fault);
      },
    );
  };
  process.on("SIGINT", handle);
  process.on("SIGTERM", handle);
}
