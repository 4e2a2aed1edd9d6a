import { Op, type WhereOptions } from "sequelize";
import type { LedgerQuery } from "../../shared/contracts/ledger.ts";
import { LedgerEntry } from "../models/LedgerEntry.ts";
import { Survey, SurveySteward } from "../models/Survey.ts";
import type { Reader } from "../policies/policy.ts";

const PAGE = 100;

/** An entry with the title of the survey it belongs to, where that still stands. */
export interface LedgerLine {
  entry: LedgerEntry;
  surveyTitle: string | null;
}

/** Administrators read everything, stewards what concerns their surveys, everyone what they did themselves. */
async function scopeOf(reader: Reader): Promise<WhereOptions<LedgerEntry>> {
  if (reader.roles.includes("administrator")) return {};
  const surveys = reader.roles.includes("steward") ? await SurveySteward.findAll({ where: { personId: reader.id } }) : [];
  return { [Op.or]: [{ actorId: reader.id }, { surveyId: surveys.map((row) => row.surveyId) }] };
}

/** One page of what a reader may read, newest first. @param limit Entries at most. */
export async function readLedger(
  reader: Reader,
  query: LedgerQuery,
  limit: number = PAGE,
): Promise<{ lines: LedgerLine[]; next: number | null }> {
  const conditions: WhereOptions<LedgerEntry>[] = [await scopeOf(reader)];
  if (query.survey) conditions.push({ surveyId: query.survey });
  if (query.action) conditions.push({ action: query.action });
  if (query.before) conditions.push({ id: { [Op.lt]: query.before } });
  if (query.text) {
    const pattern = `%${query.text.replaceAll(/[\\%_]/g, "\\$&")}%`;
    conditions.push({ [Op.or]: [{ summary: { [Op.like]: pattern } }, { actorName: { [Op.like]: pattern } }] });
  }
  const entries = await LedgerEntry.findAll({ where: { [Op.and]: conditions }, order: [["id", "DESC"]], limit: limit + 1 });
  const shown = entries.slice(0, limit);
  const ids = [...new Set(shown.flatMap((entry) => entry.surveyId ?? []))];
  const titles = new Map((await Survey.findAll({ where: { id: ids } })).map((survey) => [survey.id, survey.title]));
  const lines = shown.map((entry) => ({ entry, surveyTitle: entry.surveyId ? (titles.get(entry.surveyId) ?? null) : null }));
  return { lines, next: entries.length > limit ? (shown.at(-1)?.id ?? null) : null };
}
