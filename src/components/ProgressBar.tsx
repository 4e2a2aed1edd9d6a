import { Label, ProgressBar as AriaProgressBar } from "react-aria-components";

/** Share of work done. `value` from 0 to 1; null while it isn't known yet. */
export function ProgressBar({ label, value, detail }: { label: string; value: number | null; detail?: string }) {
  const percent = value === null ? null : Math.min(100, Math.max(0, value * 100));
  return (
    <AriaProgressBar
      value={percent ?? 0}
      isIndeterminate={percent === null}
      valueLabel={percent === null ? "" : `${Math.floor(percent)} %`}
    >
      {({ valueText }) => (
        <>
          <div className="flex flex-wrap justify-between gap-x-4 text-sm">
            <Label>{label}</Label>
            <span className="text-muted tabular-nums">{[detail, valueText].filter(Boolean).join(" · ")}</span>
          </div>
          <div className="mt-1.5 h-1.5 overflow-hidden rounded-full bg-line">
            <div
              className={`h-full bg-action transition-[width] duration-300 ${percent === null ? "w-1/3 animate-pulse" : ""}`}
              style={percent === null ? undefined : { width: `${percent}%` }}
            />
          </div>
        </>
      )}
    </AriaProgressBar>
  );
}
