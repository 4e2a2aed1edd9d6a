import { CircleCheck, CircleDashed, CircleSlash, History } from "lucide-react";
import type { ReleaseStatus } from "../../shared/contracts/holdings.ts";

const STATUSES = {
  draft: { word: "Draft", Icon: CircleDashed, tone: "text-higher-text" },
  published: { word: "Published", Icon: CircleCheck, tone: "text-well" },
  superseded: { word: "Superseded", Icon: History, tone: "text-muted" },
  withdrawn: { word: "Withdrawn", Icon: CircleSlash, tone: "text-wrong" },
} as const;

/** Where a release is in its life, by word and mark. */
export function ReleaseStatusMark({ status }: { status: ReleaseStatus }) {
  const { word, Icon, tone } = STATUSES[status];
  return (
    <span className="inline-flex items-center gap-1.5 whitespace-nowrap">
      <Icon aria-hidden="true" className={`size-4 ${tone}`} />
      {word}
    </span>
  );
}
