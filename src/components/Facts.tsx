import type { ReactNode } from "react";

/** Label and value, line by line. Values keep together; a long one wraps under itself. */
export function Facts({ facts }: { facts: readonly { label: string; value: ReactNode; note?: ReactNode }[] }) {
  return (
    <dl className="border-t border-line">
      {facts.map(({ label, value, note }) => (
        <div
          key={label}
          className="grid grid-cols-[minmax(7rem,1fr)_minmax(0,auto)] items-baseline gap-x-6 gap-y-0.5 border-b border-line py-2 text-[0.9375rem]"
        >
          <dt className="text-muted">{label}</dt>
          <dd className="min-w-0 text-right wrap-anywhere tabular-nums">{value}</dd>
          {note !== undefined && <dd className="col-span-2 text-sm text-muted">{note}</dd>}
        </div>
      ))}
    </dl>
  );
}
