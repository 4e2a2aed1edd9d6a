import type { ImportView } from "../../shared/contracts/imports.ts";
import type { Import } from "../models/Import.ts";

/** An import as its survey's stewards see it. */
export function presentImport(row: Import): ImportView {
  return {
    id: row.id,
    surveyId: row.surveyId,
    releaseId: row.releaseId,
    wave: row.wave,
    status: row.status,
    stage: row.stage,
    bytesDone: Number(row.bytesDone),
    bytesTotal: Number(row.bytesTotal),
    rows: row.rowCount,
    problems: row.problems,
    startedAt: row.startedAt.toISOString(),
    endedAt: row.endedAt?.toISOString() ?? null,
    can: { cancel: row.status === "queued" || row.status === "running" },
  };
}
