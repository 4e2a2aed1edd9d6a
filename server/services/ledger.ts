import type { Transaction } from "sequelize";
import type { LedgerAction } from "../../shared/contracts/ledger.ts";
import { LedgerEntry } from "../models/LedgerEntry.ts";

/** Who acts: a signed-in person, or null where nobody is, such as at a refused sign-in. */
export type Actor = { id: string; name: string } | null;

/**
 * Writes an act into the ledger, inside the transaction that does it, so that neither stands without the other.
 * @param act.summary A sentence without any figure of the data and without secrets.
 */
export async function record(
  transaction: Transaction,
  actor: Actor,
  act: { action: LedgerAction; surveyId?: string | null; subjectId?: string | null; summary: string },
): Promise<void> {
  await LedgerEntry.create(
    {
      at: new Date(),
      actorId: actor?.id ?? null,
      actorName: actor?.name ?? null,
      action: act.action,
      surveyId: act.surveyId ?? null,
      subjectId: act.subjectId ?? null,
      summary: act.summary.slice(0, 2000),
    },
    { transaction },
  );
}
