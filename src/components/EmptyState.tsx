import type { ReactNode } from "react";

/** Where nothing is yet: what will stand here, why, and how to begin. */
export function EmptyState({ title, children, actions }: { title: string; children: ReactNode; actions?: ReactNode }) {
  return (
    <div className="border-l-2 border-action-soft py-2 pl-5">
      <p className="text-lg font-light">{title}</p>
      <div className="measure mt-1 space-y-2 text-muted">{children}</div>
      {actions !== undefined && <div className="mt-4 flex flex-wrap gap-3">{actions}</div>}
    </div>
  );
}
