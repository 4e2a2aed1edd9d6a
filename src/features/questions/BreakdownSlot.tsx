import { ArrowUp, X } from "lucide-react";
import { useState } from "react";
import type { VariableView } from "../../../shared/contracts/codebook.ts";
import type { Breakdown } from "../../../shared/contracts/questions.ts";
import { breakdownWords, variableLabel } from "../../../shared/wording.ts";
import { Button } from "../../components/Button.tsx";
import { BandsEditor } from "./BandsEditor.tsx";
import { bandsText } from "./bands.ts";
import { BackToVariables } from "./OutcomeSlot.tsx";
import { SearchList } from "./SearchList.tsx";
import { Slot } from "./Slot.tsx";
import { variableChoice } from "./variables.ts";

interface BreakdownProps {
  variables: readonly VariableView[];
  breakdowns: readonly Breakdown[];
  /** Variables that split the other side. */
  taken: readonly string[];
  most: number;
  onChange: (breakdowns: Breakdown[]) => void;
}

function ChosenBreakdowns({ variables, breakdowns, onChange, onBands }: BreakdownProps & { onBands: (name: string) => void }) {
  return (
    <ul className="border-t border-line">
      {breakdowns.map(({ variable, bands }, index) => {
        const words = variableLabel(variables, variable);
        const before = breakdowns[index - 1];
        const current = breakdowns[index];
        return (
          <li key={variable} className="flex items-center justify-between gap-3 border-b border-line py-1.5">
            <span className="min-w-0">
              {words}
              {bands && <span className="block truncate text-sm text-muted">{bandsText(bands)}</span>}
            </span>
            <span className="flex shrink-0 items-center">
              {bands && (
                <Button kind="plain" aria-label={`Change the bands of ${words}`} onPress={() => onBands(variable)}>
                  Bands
                </Button>
              )}
              {before && current && (
                <Button
                  kind="plain"
                  aria-label={`Move ${words} up`}
                  onPress={() => onChange(breakdowns.with(index - 1, current).with(index, before))}
                >
                  <ArrowUp aria-hidden="true" className="size-4" />
                </Button>
              )}
              <Button kind="plain" aria-label={`Remove ${words}`} onPress={() => onChange(breakdowns.toSpliced(index, 1))}>
                <X aria-hidden="true" className="size-4" />
              </Button>
            </span>
          </li>
        );
      })}
    </ul>
  );
}

/** Breakdowns to choose, order and take out. */
export function BreakdownChooser(props: BreakdownProps & { onDone: () => void }) {
  const { variables, breakdowns, taken, most, onChange, onDone } = props;
  const [isAdding, setIsAdding] = useState(breakdowns.length === 0);
  const [name, setName] = useState<string | null>(null);
  const banded = variables.find((variable) => variable.name === name);
  const put = (breakdown: Breakdown) => {
    const index = breakdowns.findIndex(({ variable }) => variable === breakdown.variable);
    onChange(index < 0 ? [...breakdowns, breakdown] : breakdowns.with(index, breakdown));
    onDone();
  };
  if (banded)
    return (
      <>
        <BackToVariables variable={banded} onBack={() => setName(null)} />
        <BandsEditor
          key={banded.name}
          variable={banded}
          bands={breakdowns.find(({ variable }) => variable === banded.name)?.bands ?? null}
          onUse={(bands) => put({ variable: banded.name, bands })}
        />
      </>
    );
  if (isAdding)
    return (
      <SearchList
        label="Variables"
        choices={variables.map(variableChoice)}
        disabled={[...taken, ...breakdowns.map(({ variable }) => variable)]}
        onChoose={(chosen) => {
          const variable = variables.find((variable) => variable.name === chosen);
          if (variable?.kind === "numeric") setName(chosen);
          else put({ variable: chosen });
        }}
      />
    );
  return (
    <div className="space-y-4 px-4 pb-4">
      <ChosenBreakdowns {...props} onBands={setName} />
      {breakdowns.length === 0 && <p className="text-muted">Nothing splits the table on this side.</p>}
      {breakdowns.length < most ? (
        <Button onPress={() => setIsAdding(true)}>{breakdowns.length === 0 ? "Choose a variable" : "Split further"}</Button>
      ) : (
        <p className="text-sm text-muted">This side takes at most {most}.</p>
      )}
    </div>
  );
}

/** What splits the table on one side, in order: the first is outermost. */
export function BreakdownSlot({ side, ...props }: BreakdownProps & { side: "down" | "across" }) {
  const isEmpty = props.breakdowns.length === 0;
  return (
    <Slot
      title={side === "down" ? "Split into rows by" : "Split into columns by"}
      value={isEmpty ? "nothing" : breakdownWords(props.breakdowns, props.variables)}
      isEmpty={isEmpty}
    >
      {(close) => <BreakdownChooser {...props} onDone={close} />}
    </Slot>
  );
}
