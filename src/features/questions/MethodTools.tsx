import type { Question } from "../../../shared/contracts/questions.ts";
import { CheckboxGroup } from "../../components/Checkbox.tsx";
import { RadioChoices } from "../../components/RadioChoices.tsx";
import type { Draft } from "./draft.ts";
import { MEASURES, measureLabels, type Measure } from "./measures.ts";
import { Slot } from "./Slot.tsx";
import { SORT_MEASURES, sortLabels, type SortMeasure } from "./sorting.ts";

const LEVELS = [
  { value: "90", label: "90 %", detail: "Narrower; one interval in ten misses the true value." },
  { value: "95", label: "95 %", detail: "Customary; one in twenty misses it." },
  { value: "99", label: "99 %", detail: "For decisions where missing it costs much; one in a hundred misses it." },
] as const;

const INTERVALS: readonly { value: Question["interval"]; label: string; detail: string }[] = [
  {
    value: "korn-graubard",
    label: "Korn–Graubard",
    detail: "Take this unless a protocol says otherwise: it holds for rare outcomes and small groups too.",
  },
  { value: "logit", label: "Logit", detail: "To match other survey software; good between about 2 and 98 of every 100." },
  { value: "wilson", label: "Wilson", detail: "Narrower for rare outcomes in groups of moderate size." },
  { value: "linear", label: "Linear", detail: "To match old reports; only for large groups and middling shares." },
];

const DIFFERENCES: readonly { value: Question["difference"]; label: string; detail: string }[] = [
  { value: "linear", label: "Linear", detail: "Take this for groups of usual size." },
  {
    value: "mover",
    label: "MOVER",
    detail: "For rare outcomes or small groups: its limits follow each side's own lopsided interval.",
  },
];

const ADJUSTMENTS: readonly { value: Question["adjustment"]; label: string; detail: string }[] = [
  { value: "none", label: "None", detail: "For one comparison that was planned beforehand." },
  { value: "holm", label: "Holm", detail: "When a single false alarm anywhere in the table would do harm." },
  {
    value: "benjamini-hochberg",
    label: "Benjamini–Hochberg",
    detail: "For searching a table: few of the differences shown are false alarms.",
  },
];

interface ToolProps {
  draft: Draft;
  onChange: (changes: Partial<Draft>) => void;
}

export function IntervalTool({ draft, onChange }: ToolProps) {
  const isMean = draft.outcome !== null && "variable" in draft.outcome;
  return (
    <Slot look="tool" title="Intervals" value={`${draft.level} % intervals`}>
      {() => (
        <div className="space-y-6 px-4 pb-5">
          <RadioChoices
            label="Level"
            choices={LEVELS}
            value={`${draft.level}`}
            onChange={(level) => onChange({ level: level === "90" ? 90 : level === "95" ? 95 : 99 })}
          />
          {isMean ? (
            <p className="text-sm text-muted">Intervals of a mean are linear.</p>
          ) : (
            <RadioChoices
              label="Method"
              choices={INTERVALS}
              value={draft.interval}
              onChange={(interval) => onChange({ interval })}
            />
          )}
        </div>
      )}
    </Slot>
  );
}

export function DifferenceTool({ draft, onChange }: ToolProps) {
  if (draft.comparison.kind === "none") return null;
  return (
    <Slot look="tool" title="Differences" value={draft.adjustment === "none" ? "Adjust" : "Adjusted"}>
      {() => (
        <div className="space-y-6 px-4 pb-5">
          <RadioChoices
            label="Adjustment for many comparisons"
            choices={ADJUSTMENTS}
            value={draft.adjustment}
            onChange={(adjustment) => onChange({ adjustment })}
          />
          <RadioChoices
            label="Interval of a difference"
            choices={DIFFERENCES}
            value={draft.difference}
            onChange={(difference) => onChange({ difference })}
          />
        </div>
      )}
    </Slot>
  );
}

export function MeasuresTool({ measures, onChange }: { measures: readonly Measure[]; onChange: (measures: Measure[]) => void }) {
  return (
    <Slot look="tool" title="What a cell shows" value="Measures">
      {() => (
        <div className="px-4 pb-5">
          <CheckboxGroup
            label="Beside the estimate"
            choices={MEASURES.map((measure) => ({ value: measure, label: measureLabels[measure] }))}
            value={measures}
            onChange={onChange}
          />
        </div>
      )}
    </Slot>
  );
}

const ORDERS = SORT_MEASURES.map((measure) => ({ value: measure, label: sortLabels[measure] }));

export function OrderTool({ measure, onChange }: { measure: SortMeasure; onChange: (measure: SortMeasure) => void }) {
  return (
    <Slot look="tool" title="Order of the rows" value="Order">
      {() => (
        <div className="px-4 pb-5">
          <RadioChoices
            label="What a column's heading sorts by"
            choices={ORDERS}
            value={measure}
            onChange={onChange}
            description="Press a column's heading to sort by it: highest first, then lowest first, then as in the codebook."
          />
        </div>
      )}
    </Slot>
  );
}
