import { randomUUID } from "node:crypto";
import type { Sequelize, Transaction } from "sequelize";
import { connectDatabase } from "../database.ts";
import { ColumnSegment } from "../models/Column.ts";
import { Import } from "../models/Import.ts";
import { Release } from "../models/Release.ts";
import { Category, Variable } from "../models/Variable.ts";
import { record } from "../services/ledger.ts";
import { importFiles, type ImportOutcome } from "./importFiles.ts";
import type { ImportProblem } from "./problems.ts";

/** What a worker needs to bring a release in. */
export interface ImportWork {
  databaseUrl: string;
  importId: string;
  surveyId: string;
  wave: string;
  microdataPath: string;
  codebookPath: string | null;
  actor: { id: string; name: string };
}

/** How an import ended. A failure of ours (no space, no database) throws instead. */
export type ImportEnd =
  { kind: "done"; releaseId: string } | { kind: "failed"; problems: ImportProblem[] } | { kind: "cancelled" };

const PROGRESS_MS = 300;
const ROWS_AT_ONCE = 500;

type Imported = Extract<ImportOutcome, { respondents: number }>;

async function keep(transaction: Transaction, work: ImportWork, releaseId: string, imported: Imported): Promise<void> {
  await Release.create(
    {
      id: releaseId,
      surveyId: work.surveyId,
      wave: work.wave,
      respondents: imported.respondents,
      checksum: imported.checksum,
      createdBy: work.actor.id,
      createdAt: new Date(),
    },
    { transaction },
  );
  for (let at = 0; at < imported.variables.length; at += ROWS_AT_ONCE)
    await Variable.bulkCreate(
      imported.variables.slice(at, at + ROWS_AT_ONCE).map((variable) => ({ ...variable, categories: undefined, releaseId })),
      { transaction },
    );
  const categories = imported.variables.flatMap((variable) =>
    variable.categories.map((category, i) => ({
      ...category,
      variableId: variable.id,
      respondents: variable.categoryRows[i] ?? 0,
    })),
  );
  for (let at = 0; at < categories.length; at += ROWS_AT_ONCE)
    await Category.bulkCreate(categories.slice(at, at + ROWS_AT_ONCE), { transaction });
}

/** Everything an import writes is in this one transaction: a process that dies leaves nothing of it. */
async function bringIn(
  sequelize: Sequelize,
  work: ImportWork,
  signal: AbortSignal,
  onProgress: Parameters<typeof importFiles>[0]["onProgress"],
): Promise<ImportEnd> {
  const transaction = await sequelize.transaction();
  try {
    // Segments come before their variable is complete; with the checks off they also don't hold locks on survey and people for long.
    await sequelize.query("SET SESSION foreign_key_checks = 0", { transaction });
    const outcome = await importFiles(
      { microdataPath: work.microdataPath, codebookPath: work.codebookPath, signal, onProgress },
      {
        async put(variableId, segment, { encoding, rowCount, bytes, checksum }) {
          await ColumnSegment.create(
            { variableId, segment, encoding, rowCount, bytes: Buffer.from(bytes), checksum },
            { transaction },
          );
        },
      },
    );
    if (!("respondents" in outcome)) {
      await transaction.rollback();
      return { kind: "failed", problems: outcome.problems };
    }
    await sequelize.query("SET SESSION foreign_key_checks = 1", { transaction });
    const releaseId = randomUUID();
    await keep(transaction, work, releaseId, outcome);
    await Import.update(
      {
        status: "done",
        stage: "Brought in",
        releaseId,
        rowCount: outcome.respondents,
        problems: outcome.problems,
        endedAt: new Date(),
      },
      { where: { id: work.importId }, transaction },
    );
    await record(transaction, work.actor, {
      action: "import.finished",
      surveyId: work.surveyId,
      subjectId: releaseId,
      summary: `Brought in the release ${work.wave}: ${outcome.respondents} respondents, ${outcome.variables.length} variables.`,
    });
    signal.throwIfAborted();
    await transaction.commit();
    return { kind: "done", releaseId };
  } catch (error) {
    // Where the connection is gone, the server has rolled back by itself.
    await transaction.rollback().catch(() => undefined);
    if (signal.aborted) return { kind: "cancelled" };
    throw error;
  }
}

/** The worker's entry: brings one release in on connections of its own, tells of its progress, and stops when asked to. */
export default async function importWork(work: ImportWork): Promise<ImportEnd> {
  const sequelize = connectDatabase(work.databaseUrl);
  const cancel = new AbortController();
  let latest = { stage: "Starting", bytesDone: 0, bytesTotal: 0, rows: 0 };
  const tell = async () => {
    const { stage, bytesDone, bytesTotal, rows } = latest;
    await Import.update(
      { status: "running", stage, bytesDone, bytesTotal, rowCount: rows, heartbeatAt: new Date() },
      { where: { id: work.importId, status: ["queued", "running"] } },
    );
    const row = await Import.findByPk(work.importId, { attributes: ["isCancelAsked"] });
    if (row?.isCancelAsked !== false) cancel.abort();
  };
  try {
    await tell();
    let telling: Promise<void> | null = null;
    const timer = setInterval(() => {
      telling ??= tell().finally(() => (telling = null));
      telling.catch(() => cancel.abort());
    }, PROGRESS_MS);
    try {
      return await bringIn(sequelize, work, cancel.signal, (progress) => (latest = progress));
    } finally {
      clearInterval(timer);
      await Promise.resolve(telling).catch(() => undefined);
    }
  } finally {
    await sequelize.close();
  }
}
