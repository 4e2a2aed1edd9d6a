import { useState } from "react";
import type { VariableView } from "../../../shared/contracts/codebook.ts";
import type { Comparison } from "../../../shared/contracts/questions.ts";
import { codeLabel, comparisonWords, variableLabel } from "../../../shared/wording.ts";
import { Button } from "../../components/Button.tsx";
import { Chooser, type Choice } from "../../components/Chooser.tsx";
import { RadioChoices } from "../../components/RadioChoices.tsx";
import { TextField } from "../../components/TextField.tsx";
import type { Draft } from "./draft.ts";
import { Slot } from "./Slot.tsx";
import { answers } from "./variables.ts";

const KINDS = [
  { value: "none", label: "Nothing", detail: "Estimates alone." },
  { value: "all", label: "Everyone", detail: "Each group against all the people asked about, itself among them." },
  {
    value: "rest",
    label: "The rest",
    detail: "Each group against all who aren't in it. The clearest for “does this group stand out?”",
  },
  {
    value: "release",
    label: "Another wave",
    detail: "Each group against itself in another release of this survey: has it changed?",
  },
  { value: "group", label: "One group", detail: "Every group against a group that you name, such as the youngest." },
  { value: "target", label: "A fixed value", detail: "Such as a target that has been set. It has no uncertainty of its own." },
] as const satisfies readonly { value: Comparison["kind"]; label: string; detail: string }[];

/** Every group of one value that a table could be compared with. */
function groupChoices(draft: Draft, variables: readonly VariableView[]): (Choice & { breakdown: string; value: string })[] {
  return [...draft.down, ...draft.across].flatMap(({ variable, bands }) => {
    const codebookVariable = variables.find(({ name }) => name === variable);
    const codes = codebookVariable ? answers(codebookVariable).map(({ code }) => code) : [];
    const values = bands
      ? bands.map(([, , label], index) => ({ value: String(index + 1), label }))
      : codes.map((code) => ({ value: code, label: codeLabel(variables, variable, code) }));
    return values.map(({ value, label }) => ({
      id: JSON.stringify([variable, value]),
      label: `${variableLabel(variables, variable)}: ${label}`,
      breakdown: variable,
      value,
    }));
  });
}

interface ComparisonProps {
  draft: Draft;
  variables: readonly VariableView[];
  /** Other releases of the same survey, by id. */
  waves: ReadonlyMap<string, string>;
  onChange: (comparison: Comparison) => void;
}

function ComparisonChooser({ draft, variables, waves, onChange, onDone }: ComparisonProps & { onDone: () => void }) {
  const { comparison, outcome } = draft;
  const isMean = outcome !== null && "variable" in outcome;
  const [kind, setKind] = useState<Comparison["kind"]>(comparison.kind);
  const written = comparison.kind === "target" ? Number((comparison.value * (isMean ? 1 : 100)).toPrecision(12)) : null;
  const [target, setTarget] = useState(written === null ? "" : String(written));
  const groups = groupChoices(draft, variables);
  const [groupId, setGroupId] = useState(
    comparison.kind === "group" ? JSON.stringify([comparison.breakdown, comparison.value]) : null,
  );
  const [waveId, setWaveId] = useState(comparison.kind === "release" ? comparison.releaseId : null);
  const [problem, setProblem] = useState<string>();
  const group = groups.find(({ id }) => id === groupId);
  const readTarget = (): number | string => {
    const value = target.trim() === "" ? NaN : Number(target.replace(",", "."));
    if (!Number.isFinite(value)) return "Write a plain number, such as 20 or 7.5.";
    if (!isMean && (value < 0 || value > 100)) return "Write how many of every 100: from 0 to 100.";
    return isMean ? value : value / 100;
  };
  const use = () => {
    if (kind === "group") {
      if (!group) {
        setProblem("Choose the group that the others are compared with.");
        return;
      }
      onChange({ kind, breakdown: group.breakdown, value: group.value });
    } else if (kind === "target") {
      const value = readTarget();
      if (typeof value === "string") {
        setProblem(value);
        return;
      }
      onChange({ kind, value });
    } else if (kind === "release") {
      if (waveId === null) {
        setProblem("Choose the wave to compare with.");
        return;
      }
      onChange({ kind, releaseId: waveId });
    } else onChange({ kind });
    onDone();
  };
  return (
    <form
      className="space-y-4 px-4 pb-4"
      onSubmit={(event) => {
        event.preventDefault();
        use();
      }}
    >
      <RadioChoices label="Compare each group with" choices={KINDS} value={kind} onChange={setKind} />
      {kind === "group" &&
        (groups.length === 0 ? (
          <p className="text-sm text-muted">Split the table first; then one of its groups can be chosen.</p>
        ) : (
          <Chooser label="Reference group" choices={groups} value={groupId} onChange={setGroupId} error={problem} />
        ))}
      {kind === "release" &&
        (waves.size === 0 ? (
          <p className="text-sm text-muted">No other release of this survey is open to you.</p>
        ) : (
          <Chooser
            label="Wave"
            choices={[...waves].map(([id, label]) => ({ id, label }))}
            value={waveId}
            onChange={setWaveId}
            error={problem}
          />
        ))}
      {kind === "target" && (
        <TextField
          label={isMean ? "Value" : "Of every 100"}
          inputMode="decimal"
          value={target}
          onChange={setTarget}
          error={problem}
          autoFocus
        />
      )}
      <Button kind="primary" type="submit">
        Compare
      </Button>
    </form>
  );
}

/** What each group is set against. */
export function ComparisonSlot(props: ComparisonProps) {
  const { draft, variables, waves } = props;
  const isMean = draft.outcome !== null && "variable" in draft.outcome;
  const words = comparisonWords(draft.comparison, variables, [...draft.down, ...draft.across], isMean, waves);
  return (
    <Slot title="Compared with what?" value={words ?? "nothing"} isEmpty={words === null}>
      {(close) => <ComparisonChooser {...props} onDone={close} />}
    </Slot>
  );
}
