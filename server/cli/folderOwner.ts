import { existsSync } from "node:fs";
import { readFile, rm, writeFile } from "node:fs/promises";
import path from "node:path";
import { setTimeout as pause } from "node:timers/promises";
import { CommandFault } from "./fault.ts";

const ORPHAN_TIMEOUT_MS = 30_000;

async function readPid(file: string): Promise<number | null> {
  if (!existsSync(file)) return null;
  const pid = Number((await readFile(file, "utf8")).trim());
  return Number.isInteger(pid) && pid > 1 ? pid : null;
}

/** The command line of a running process; null where none runs under this id. */
async function commandOf(pid: number): Promise<string | null> {
  try {
    process.kill(pid, 0);
    return (await readFile(`/proc/${pid}/cmdline`, "utf8")).replaceAll("\0", " ");
  } catch {
    return null;
  }
}

/** Ends a database server that a killed run of ours left over this very folder. */
async function endOrphan(folder: string): Promise<void> {
  const pid = await readPid(path.join(folder, "mariadb.pid"));
  if (pid === null) return;
  const isOurs = (await commandOf(pid))?.includes(`--datadir=${path.join(folder, "data")}`);
  if (!isOurs) return;
  process.kill(pid, "SIGTERM");
  const deadline = Date.now() + ORPHAN_TIMEOUT_MS;
  while ((await commandOf(pid)) !== null) {
    if (Date.now() > deadline)
      throw new CommandFault(
        "databaseWontStart",
        `A database server of an earlier run (process ${pid}) won't end. End it by hand and start again.`,
      );
    await pause(50);
  }
}

/**
 * Makes this process the only one that uses a database folder, tidying up after one that was killed.
 * @returns A function that lets the folder go.
 * @throws {CommandFault} `dataInUse` when another run uses it.
 */
export async function ownFolder(folder: string): Promise<() => Promise<void>> {
  const file = path.join(folder, "owner.pid");
  const owner = await readPid(file);
  if (owner !== null && owner !== process.pid && (await commandOf(owner))?.includes("node")) {
    throw new CommandFault(
      "dataInUse",
      `Another Perhundred (process ${owner}) uses ${folder}. Nothing was started. Stop it, or give another folder: PERHUNDRED_DATA=… npm start`,
    );
  }
  await endOrphan(folder);
  await writeFile(file, `${process.pid}\n`);
  return () => rm(file, { force: true });
}
