import type { VariableView } from "../../../shared/contracts/codebook.ts";
import { averageWords, correctionWords } from "../../../shared/wording.ts";
import { BreakdownSlot } from "./BreakdownSlot.tsx";
import { ComparisonSlot } from "./ComparisonSlot.tsx";
import type { Draft } from "./draft.ts";
import { OutcomeSlot } from "./OutcomeSlot.tsx";
import { PopulationSlot } from "./PopulationSlot.tsx";
import { otherWaves, releaseChoice, releaseName, type AskableRelease } from "./releases.ts";
import { SearchList } from "./SearchList.tsx";
import { Slot } from "./Slot.tsx";

export interface QuestionLineProps {
  draft: Draft;
  releases: readonly AskableRelease[];
  variables: readonly VariableView[];
  /** The words for the variables aren't here yet. */
  isPending: boolean;
  onChange: (changes: Partial<Draft>) => void;
}

function ReleaseSlot({ draft, releases, onChange }: Omit<QuestionLineProps, "variables" | "isPending">) {
  const release = releases.find(({ id }) => id === draft.releaseId);
  return (
    <Slot title="In which survey?" value={release ? releaseName(release) : "choose a release"} isEmpty={!release}>
      {(close) => (
        <SearchList
          label="Published releases"
          choices={releases.map(releaseChoice)}
          chosen={draft.releaseId}
          onChoose={(releaseId) => {
            onChange({ releaseId });
            close();
          }}
        />
      )}
    </Slot>
  );
}

/** The question as a sentence whose parts can be chosen anew. */
export function QuestionLine({ draft, releases, variables, isPending, onChange }: QuestionLineProps) {
  const isMean = draft.outcome !== null && "variable" in draft.outcome;
  const correction = correctionWords(draft, variables);
  const names = (breakdowns: Draft["down"]) => breakdowns.map(({ variable }) => variable);
  return (
    <span
      className={`block max-w-[54rem] text-[1.3125rem] leading-[1.65] text-pretty sm:text-[1.625rem] ${isPending ? "opacity-0" : ""}`}
    >
      In <ReleaseSlot draft={draft} releases={releases} onChange={onChange} />
      {isMean ? ", among " : ", of every 100 "}
      <PopulationSlot variables={variables} among={draft.among} onChange={(among) => onChange({ among })} />
      {isMean && draft.outcome ? `, what is the ${averageWords(draft.outcome)} of ` : ", how many have "}
      <OutcomeSlot variables={variables} outcome={draft.outcome} onChange={(outcome) => onChange({ outcome })} />? Split by{" "}
      <BreakdownSlot
        side="down"
        most={3}
        variables={variables}
        breakdowns={draft.down}
        taken={names(draft.across)}
        onChange={(down) => onChange({ down })}
      />{" "}
      down and{" "}
      <BreakdownSlot
        side="across"
        most={2}
        variables={variables}
        breakdowns={draft.across}
        taken={names(draft.down)}
        onChange={(across) => onChange({ across })}
      />{" "}
      across. Compared with{" "}
      <ComparisonSlot
        draft={draft}
        variables={variables}
        waves={otherWaves(releases, draft.releaseId)}
        onChange={(comparison) => onChange({ comparison })}
      />
      .{correction && ` ${correction}`}
    </span>
  );
}
