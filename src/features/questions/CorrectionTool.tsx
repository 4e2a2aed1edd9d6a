import { useState } from "react";
import type { VariableView } from "../../../shared/contracts/codebook.ts";
import type { Band, Standardisation } from "../../../shared/contracts/questions.ts";
import { STANDARDS } from "../../../shared/standards.ts";
import { breakdownWords } from "../../../shared/wording.ts";
import { Button } from "../../components/Button.tsx";
import { RadioChoices } from "../../components/RadioChoices.tsx";
import { TextField } from "../../components/TextField.tsx";
import { bandLabel } from "./bands.ts";
import { BandsEditor } from "./BandsEditor.tsx";
import { BreakdownChooser } from "./BreakdownSlot.tsx";
import type { Draft } from "./draft.ts";
import { BackToVariables } from "./OutcomeSlot.tsx";
import { SearchList } from "./SearchList.tsx";
import { Slot } from "./Slot.tsx";
import { variableChoice } from "./variables.ts";

type Kind = "crude" | "standardised" | "adjusted";

const KINDS: { value: Kind; label: string; detail: string }[] = [
  { value: "crude", label: "As they are", detail: "The groups as they live: what a campaign meets." },
  {
    value: "standardised",
    label: "Standardised",
    detail: "As if every group had the same ages, say: to compare groups or places fairly by one variable.",
  },
  {
    value: "adjusted",
    label: "Adjusted",
    detail: "Regression on several variables at once: what difference is left between groups alike in these.",
  },
];

interface CorrectionProps {
  draft: Draft;
  variables: readonly VariableView[];
  onChange: (changes: Partial<Draft>) => void;
}

/** Bands of adults that fit each published standard; they can be changed. */
const ADULT_BANDS: Record<string, readonly (readonly [number, number | null])[]> = {
  "who-2000-2025": [
    [20, 34],
    [35, 49],
    [50, 64],
    [65, null],
  ],
  "europe-2013": [
    [20, 34],
    [35, 49],
    [50, 64],
    [65, null],
  ],
  "us-2000": [
    [25, 44],
    [45, 64],
    [65, null],
  ],
  "us-2000-adults-5": [
    [18, 24],
    [25, 34],
    [35, 44],
    [45, 64],
    [65, null],
  ],
  "us-2000-adults-3": [
    [20, 39],
    [40, 59],
    [60, null],
  ],
};

const bandsFor = (standard: string): Band[] =>
  (ADULT_BANDS[standard] ?? []).map(([from, to]) => [from, to, bandLabel([from, to])]);

/** Standardised, adjusted or crude figures. */
export function CorrectionTool({ draft, variables, onChange }: CorrectionProps) {
  const kind: Kind = draft.standardise ? "standardised" : draft.adjustFor.length > 0 ? "adjusted" : "crude";
  return (
    <Slot
      look="tool"
      title="Crude, standardised or adjusted"
      value={KINDS.find(({ value }) => value === kind)?.label ?? ""}
      isWide
    >
      {(close) => <CorrectionChooser draft={draft} variables={variables} onChange={onChange} start={kind} onDone={close} />}
    </Slot>
  );
}

function CorrectionChooser({ draft, variables, onChange, start, onDone }: CorrectionProps & { start: Kind; onDone: () => void }) {
  const [kind, setKind] = useState(start);
  const isQuantile = draft.outcome !== null && "variable" in draft.outcome && draft.outcome.quantile !== undefined;
  if (isQuantile)
    return (
      <p className="px-4 pb-5 text-muted">
        A median or another quantile stands by itself. Choose a share or a mean to standardise or adjust.
      </p>
    );
  const taken = [...draft.down, ...draft.across].map(({ variable }) => variable);
  return (
    <>
      <div className="px-4 pb-4">
        <RadioChoices
          label="Figures"
          choices={KINDS}
          value={kind}
          onChange={(chosen) => {
            setKind(chosen);
            if (chosen === "crude") onChange({ standardise: undefined, adjustFor: [] });
          }}
        />
      </div>
      {kind === "standardised" && (
        <StandardChooser
          standardise={draft.standardise}
          variables={variables}
          taken={taken}
          onUse={(standardise) => {
            onChange({ standardise, adjustFor: [] });
            onDone();
          }}
        />
      )}
      {kind === "adjusted" && (
        <BreakdownChooser
          variables={variables}
          breakdowns={draft.adjustFor}
          taken={taken}
          most={5}
          onChange={(adjustFor) => {
            const isIncomparable = ["rest", "all", "release"].includes(draft.comparison.kind);
            onChange({ adjustFor, standardise: undefined, ...(isIncomparable ? { comparison: { kind: "none" } } : {}) });
          }}
          onDone={onDone}
        />
      )}
    </>
  );
}

interface StandardProps {
  standardise: Standardisation | undefined;
  variables: readonly VariableView[];
  taken: readonly string[];
  onUse: (standardise: Standardisation) => void;
}

function StandardChooser({ standardise, variables, taken, onUse }: StandardProps) {
  const [name, setName] = useState(standardise?.variable ?? null);
  const variable = variables.find((known) => known.name === name);
  if (!variable)
    return <SearchList label="Variables" choices={variables.map(variableChoice)} disabled={[...taken]} onChoose={setName} />;
  return (
    <>
      <BackToVariables variable={variable} onBack={() => setName(null)} />
      {variable.kind === "numeric" ? (
        <AgeStandard variable={variable} standardise={standardise} onUse={onUse} />
      ) : (
        <OwnWeights variable={variable} standardise={standardise} onUse={onUse} />
      )}
    </>
  );
}

type EditorProps = Pick<StandardProps, "standardise" | "onUse"> & { variable: VariableView };

function AgeStandard({ variable, standardise, onUse }: EditorProps) {
  const isOwn = standardise?.variable === variable.name;
  const given = isOwn && "standard" in standardise.weights ? standardise.weights.standard : "who-2000-2025";
  const [standard, setStandard] = useState(given);
  const [bands, setBands] = useState<Band[] | null>(isOwn ? (standardise.bands ?? null) : null);
  const [isEditing, setIsEditing] = useState(false);
  const used = bands ?? bandsFor(standard);
  if (isEditing)
    return (
      <BandsEditor
        variable={variable}
        bands={used}
        onUse={(chosen) => {
          setBands(chosen);
          setIsEditing(false);
        }}
      />
    );
  return (
    <div className="space-y-5 px-4 pb-5">
      <RadioChoices
        label="Standard population"
        choices={STANDARDS.map(({ id, label }) => ({ value: id, label }))}
        value={standard}
        onChange={(chosen) => {
          setStandard(chosen);
          setBands(null);
        }}
      />
      <p className="text-[0.9375rem]">
        Bands: {used.map(([, , label]) => label).join(", ")}.{" "}
        <Button kind="plain" onPress={() => setIsEditing(true)}>
          Change the bands
        </Button>
        <span className="block text-sm text-muted">
          They must begin and end where the standard's bands do. Who is in none of them is left out.
        </span>
      </p>
      <Button kind="primary" onPress={() => onUse({ variable: variable.name, bands: used, weights: { standard } })}>
        Standardise by this
      </Button>
    </div>
  );
}

function OwnWeights({ variable, standardise, onUse }: EditorProps) {
  const categories = variable.categories.filter(({ isMissing }) => !isMissing);
  const known = standardise?.variable === variable.name && "own" in standardise.weights ? standardise.weights.own : [];
  const [texts, setTexts] = useState(categories.map((_, i) => String(known[i] ?? "")));
  const own = texts.map((text) => (text.trim() === "" ? Number.NaN : Number(text.replace(",", "."))));
  const isReady = own.every((weight) => weight >= 0) && own.some((weight) => weight > 0);
  return (
    <div className="space-y-4 px-4 pb-5">
      <p className="text-sm text-muted">
        How many of the standard population are in each group of {breakdownWords([{ variable: variable.name }], [variable])}, in
        any unit.
      </p>
      {categories.map((category, i) => (
        <TextField
          key={category.code}
          label={category.label || category.code}
          inputMode="decimal"
          value={texts[i] ?? ""}
          onChange={(text) => setTexts(texts.with(i, text))}
        />
      ))}
      <Button kind="primary" isDisabled={!isReady} onPress={() => onUse({ variable: variable.name, weights: { own } })}>
        Standardise by these
      </Button>
    </div>
  );
}
