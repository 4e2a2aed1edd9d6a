import { OVERALL_KINDS, type OverallKind } from "../../../shared/contracts/questions.ts";
import { CheckboxGroup } from "../../components/Checkbox.tsx";
import type { Draft } from "./draft.ts";
import { Slot } from "./Slot.tsx";

const CHOICES: Record<OverallKind, { label: string; when: string }> = {
  association: {
    label: "Do the groups differ at all?",
    when: "One test for the whole table (Rao–Scott), before looking at single cells.",
  },
  trend: {
    label: "Is there a trend?",
    when: "When the groups have an order, such as age bands: the change from each to the next.",
  },
  inequality: {
    label: "How unequal are they?",
    when: "When the groups are ranked from worst off to best off, such as schooling: slope and relative index.",
  },
  attributable: {
    label: "What would equal levels mean?",
    when: "Against the reference group: risk and fraction attributable, as arithmetic, not as a cause.",
  },
};

/** Why a kind can't be asked now; null where it can. */
function obstacle(kind: OverallKind, draft: Draft): string | null {
  if (kind === "association") return draft.outcome && "variable" in draft.outcome ? "Only for a share." : null;
  if (draft.down.length + draft.across.length !== 1) return "Needs exactly one breakdown.";
  return kind === "attributable" && draft.comparison.kind !== "group" ? "Needs a reference group to compare with." : null;
}

/** What is worked out of the table as a whole. */
export function OverallTool({ draft, onChange }: { draft: Draft; onChange: (changes: Partial<Draft>) => void }) {
  if (draft.down.length + draft.across.length === 0) return null;
  return (
    <Slot look="tool" title="The table as a whole" value="Whole table">
      {() => (
        <div className="px-4 pb-5">
          <CheckboxGroup
            label="Work out"
            choices={OVERALL_KINDS.map((kind) => {
              const reason = obstacle(kind, draft);
              return {
                value: kind,
                isDisabled: reason !== null && !draft.overall.includes(kind),
                label: (
                  <>
                    {CHOICES[kind].label}
                    <span className="block text-sm text-muted">{reason ?? CHOICES[kind].when}</span>
                  </>
                ),
              };
            })}
            value={draft.overall}
            onChange={(overall) => onChange({ overall })}
          />
        </div>
      )}
    </Slot>
  );
}
