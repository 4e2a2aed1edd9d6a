import { ToggleButton, ToggleButtonGroup } from "react-aria-components";
import { VIEWS, type View } from "./address.ts";

const LABELS: Record<View, string> = { table: "Table", intervals: "Intervals", differences: "Differences" };

/** Which picture of the answer is shown. */
export function ViewChoice({
  view,
  hasComparison,
  onChange,
}: {
  view: View;
  hasComparison: boolean;
  onChange: (view: View) => void;
}) {
  return (
    <ToggleButtonGroup
      aria-label="View"
      selectionMode="single"
      disallowEmptySelection
      selectedKeys={[view]}
      onSelectionChange={(keys) => {
        const chosen = VIEWS.find((each) => keys.has(each));
        if (chosen) onChange(chosen);
      }}
      className="my-1 flex rounded-sm border border-field"
    >
      {VIEWS.filter((each) => each !== "differences" || hasComparison || view === each).map((each) => (
        <ToggleButton
          key={each}
          id={each}
          className="min-h-8 cursor-pointer px-3 text-[0.9375rem] text-muted not-first:border-l not-first:border-field hover:text-action data-[selected]:bg-action-soft data-[selected]:font-medium data-[selected]:text-action"
        >
          {LABELS[each]}
        </ToggleButton>
      ))}
    </ToggleButtonGroup>
  );
}
