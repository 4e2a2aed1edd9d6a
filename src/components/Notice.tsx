import { CircleAlert, CircleCheck, Info, TriangleAlert } from "lucide-react";
import type { ReactNode } from "react";

const KINDS = {
  note: { Icon: Info, tone: "text-muted", word: "Note" },
  done: { Icon: CircleCheck, tone: "text-well", word: "Done" },
  caution: { Icon: TriangleAlert, tone: "text-higher-text", word: "Caution" },
  wrong: { Icon: CircleAlert, tone: "text-wrong", word: "Problem" },
} as const;

/** A message in the page. `wrong` is read out at once, `done` when the reader pauses. */
export function Notice({ kind = "note", title, children }: { kind?: keyof typeof KINDS; title?: string; children?: ReactNode }) {
  const { Icon, tone, word } = KINDS[kind];
  const role = kind === "wrong" ? "alert" : kind === "done" ? "status" : undefined;
  return (
    <div role={role} className="flex gap-3 bg-sunken px-4 py-3">
      <Icon aria-label={word} role="img" className={`mt-0.5 size-5 shrink-0 ${tone}`} />
      <div className="min-w-0 flex-1 space-y-1">
        {title !== undefined && <p className="font-medium">{title}</p>}
        {children !== undefined && <div className="text-[0.9375rem] break-words">{children}</div>}
      </div>
    </div>
  );
}
