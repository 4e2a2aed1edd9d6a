import { randomUUID } from "node:crypto";
import { copyFile, mkdir, readdir, rename, rm, stat } from "node:fs/promises";
import path from "node:path";
import { Piscina } from "piscina";
import { Op, type Sequelize } from "sequelize";
import type { Config } from "../config.ts";
import { Import } from "../models/Import.ts";
import type { Logger } from "../middleware/requestLog.ts";
import { record } from "../services/ledger.ts";
import type { ImportEnd, ImportWork } from "./importWork.ts";
import type { ImportProblem } from "./problems.ts";
import { workerOptions } from "./workers.ts";

/** What is asked to be brought in; the files are the importer's from then on, and are removed at the end. */
export interface ImportRequest {
  surveyId: string;
  wave: string;
  microdataPath: string;
  codebookPath: string | null;
  actor: { id: string; name: string };
}

/** Brings releases in, one at a time, in a worker thread; others wait their turn. */
export interface Imports {
  /** Folder for uploaded files, on this machine. */
  uploadFolder: string;
  /** Begins; the row tells of the progress. */
  start(request: ImportRequest): Promise<Import>;
  /** Begins and waits for the end. */
  run(request: ImportRequest): Promise<{ releaseId: string } | { problems: ImportProblem[] }>;
  /** Asks an import to stop, whichever process runs it. What it had read is thrown away. */
  cancel(importId: string): Promise<void>;
  /** Stops running imports; nothing of them stays. */
  close(): Promise<void>;
}

const BEAT_MS = 2000;
/** An import without a sign of life for so long died with its process. */
const DEAD_AFTER_MS = 20_000;
/** A file that is still arriving after so long lost its sender. */
const ARRIVAL_LIMIT_MS = 6 * 60 * 60 * 1000;
const UNFINISHED = ["queued", "running"] as const;

const STOPPED = {
  kind: "server-stopped",
  severity: "error",
  file: "microdata",
  message: "The server stopped during this import. Nothing of it was kept; bring the files in again.",
  count: 1,
  first: [],
} satisfies ImportProblem;
const FAULT = {
  ...STOPPED,
  kind: "fault",
  message: "The import broke off through a fault of ours, which was noted. Nothing of it was kept; try again.",
} satisfies ImportProblem;

const isOlder = async (file: string, limitMs: number) => {
  const found = await stat(file).catch(() => null);
  return found !== null && Date.now() - found.mtimeMs > limitMs;
};

/** Gives an import's file a name that says whose it is, so that files of no import can be swept away. */
async function claim(file: string, claimed: string): Promise<string> {
  await rename(file, claimed).catch(async (error: unknown) => {
    const isOtherDisk = error instanceof Error && "code" in error && error.code === "EXDEV";
    if (!isOtherDisk) throw error;
    await copyFile(file, claimed);
    await rm(file);
  });
  return claimed;
}

/** Starts the importer and clears what dead processes left. @param parts.databaseUrl For the worker's own connections. */
export async function createImports(parts: {
  config: Config;
  sequelize: Sequelize;
  databaseUrl: string;
  logger: Logger;
}): Promise<Imports> {
  const { sequelize, logger, databaseUrl } = parts;
  const uploadFolder = path.join(parts.config.dataFolder, "uploads");
  await mkdir(uploadFolder, { recursive: true, mode: 0o700 });
  const pool = new Piscina<ImportWork, ImportEnd>({
    ...workerOptions(new URL("./importWork.ts", import.meta.url)),
    minThreads: 0,
    maxThreads: 1,
    idleTimeout: 10_000,
  });
  const mine = new Map<string, Promise<ImportEnd | null>>();

  async function end(
    importId: string,
    status: "failed" | "cancelled",
    problems: ImportProblem[],
    actor: ImportRequest["actor"] | null,
  ): Promise<void> {
    await sequelize.transaction(async (transaction) => {
      const row = await Import.findByPk(importId, { transaction, lock: true });
      if (!row || !UNFINISHED.some((unfinished) => unfinished === row.status)) return;
      await row.update(
        { status, stage: status === "failed" ? "Not brought in" : "Cancelled", problems, endedAt: new Date() },
        { transaction },
      );
      await record(transaction, actor, {
        action: status === "failed" ? "import.failed" : "import.cancelled",
        surveyId: row.surveyId,
        subjectId: row.id,
        summary:
          status === "failed"
            ? `The import of ${row.wave} failed: ${problems.map(({ kind }) => kind).join(", ")}.`
            : `The import of ${row.wave} was cancelled.`,
      });
    });
  }

  /** Ends what has no sign of life, and removes files that belong to no running import. */
  async function sweep(): Promise<void> {
    const deadline = new Date(Date.now() - DEAD_AFTER_MS);
    const dead = await Import.findAll({ where: { status: [...UNFINISHED], heartbeatAt: { [Op.lt]: deadline } } });
    for (const row of dead) if (!mine.has(row.id)) await end(row.id, "failed", [STOPPED], null);
    const alive = new Set((await Import.findAll({ where: { status: [...UNFINISHED] }, attributes: ["id"] })).map(({ id }) => id));
    for (const name of await readdir(uploadFolder)) {
      const [id = "", state] = name.split(".");
      const file = path.join(uploadFolder, name);
      const isLeft = state === "arriving" ? await isOlder(file, ARRIVAL_LIMIT_MS) : !alive.has(id);
      if (isLeft) await rm(file, { force: true });
    }
  }

  async function work(importId: string, request: ImportRequest): Promise<ImportEnd | null> {
    // An actor may be a model of the database, which can't be posted to a thread.
    const actor = { id: request.actor.id, name: request.actor.name };
    const { surveyId, wave, microdataPath, codebookPath } = request;
    try {
      const outcome = await pool.run({ databaseUrl, importId, surveyId, wave, microdataPath, codebookPath, actor });
      if (outcome.kind === "failed") await end(importId, "failed", outcome.problems, actor);
      if (outcome.kind === "cancelled") await end(importId, "cancelled", [], actor);
      return outcome;
    } catch (error) {
      logger.error({ err: error, importId }, "import broke off");
      await end(importId, "failed", [isClosing ? STOPPED : FAULT], actor).catch(() => undefined);
      return null;
    } finally {
      mine.delete(importId);
      for (const file of [request.microdataPath, request.codebookPath]) if (file) await rm(file, { force: true });
    }
  }

  async function start(request: ImportRequest): Promise<{ row: Import; ended: Promise<ImportEnd | null> }> {
    const now = new Date();
    const row = await sequelize.transaction(async (transaction) => {
      const created = await Import.create(
        {
          id: randomUUID(),
          surveyId: request.surveyId,
          releaseId: null,
          wave: request.wave,
          status: "queued",
          stage: "Waiting",
          problems: [],
          startedBy: request.actor.id,
          startedAt: now,
          heartbeatAt: now,
          endedAt: null,
        },
        { transaction },
      );
      await record(transaction, request.actor, {
        action: "import.started",
        surveyId: request.surveyId,
        subjectId: created.id,
        summary: `Began to bring in the release ${request.wave}.`,
      });
      return created;
    });
    const place = (field: string) => path.join(uploadFolder, `${row.id}.${field}`);
    const microdataPath = await claim(request.microdataPath, place("microdata"));
    const codebookPath = request.codebookPath === null ? null : await claim(request.codebookPath, place("codebook"));
    const ended = work(row.id, { ...request, microdataPath, codebookPath });
    mine.set(row.id, ended);
    return { row, ended };
  }

  async function cancel(importId: string): Promise<void> {
    await Import.update({ isCancelAsked: true }, { where: { id: importId, status: [...UNFINISHED] } });
  }

  let isClosing = false;
  let beating: Promise<unknown> = Promise.resolve();
  const beat = setInterval(() => {
    const ids = [...mine.keys()];
    beating = Promise.all([
      ids.length > 0 ? Import.update({ heartbeatAt: new Date() }, { where: { id: ids } }) : null,
      sweep(),
    ]).catch((error: unknown) => {
      if (!isClosing) logger.warn({ err: error }, "imports can't be looked after");
    });
  }, BEAT_MS);
  beat.unref();
  await sweep();

  return {
    uploadFolder,
    async start(request) {
      return (await start(request)).row;
    },
    async run(request) {
      const { ended, row } = await start(request);
      const outcome = await ended;
      if (outcome?.kind === "done") return { releaseId: outcome.releaseId };
      await row.reload();
      return { problems: row.problems };
    },
    cancel,
    async close() {
      isClosing = true;
      clearInterval(beat);
      await beating;
      await Promise.all([...mine.keys()].map(cancel));
      await Promise.all(mine.values());
      await pool.destroy();
    },
  };
}
