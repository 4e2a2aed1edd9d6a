import type { ShownCell } from "../../../shared/contracts/tables.ts";

/** What a figure's label says where it can't simply be relied on. */
export function reliabilityWords({ reliability }: ShownCell): string {
  if (reliability.verdict === "reliable") return "";
  return reliability.verdict === "caution" ? " (with caution)" : " (unreliable)";
}
