import type { DisclosureMinimums } from "../../../shared/contracts/design.ts";

/** Respondents of one figure; `affected` is null for a mean. */
export interface Counts {
  respondents: number;
  affected: number | null;
}

/** Whether a figure may not stand by itself: someone is there, but fewer than the release's minimums ask for. */
export function isTooFew(counts: Counts, minimums: DisclosureMinimums): boolean {
  if (counts.respondents === 0) return false;
  if (counts.respondents < minimums.respondents) return true;
  if (counts.affected === null) return false;
  return counts.affected < minimums.affected || counts.respondents - counts.affected < minimums.unaffected;
}
