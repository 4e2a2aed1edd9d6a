import { Router } from "express";
import { LedgerQuery } from "../../shared/contracts/ledger.ts";
import { currentReader, requirePerson } from "../middleware/signedIn.ts";
import { parse } from "../parse.ts";
import { ledgerCsv, presentLedgerLine } from "../presenters/ledger.ts";
import { readLedger } from "../services/readLedger.ts";

const DOWNLOAD_LIMIT = 50_000;

/** What was done. */
export function ledgerRoutes(): Router {
  const router = Router();
  router.get("/ledger", requirePerson, async (request, response) => {
    const { lines, next } = await readLedger(currentReader(request), parse(LedgerQuery, request.query));
    response.json({ entries: lines.map(presentLedgerLine), next });
  });
  router.get("/ledger.csv", requirePerson, async (request, response) => {
    const { lines } = await readLedger(currentReader(request), parse(LedgerQuery, request.query), DOWNLOAD_LIMIT);
    response.attachment("ledger.csv").type("text/csv; charset=utf-8").send(ledgerCsv(lines));
  });
  return router;
}
