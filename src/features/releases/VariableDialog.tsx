import { useState } from "react";
import type { CodebookView, VariableView } from "../../../shared/contracts/codebook.ts";
import { formatCount } from "../../../shared/format.ts";
import { Button } from "../../components/Button.tsx";
import { Checkbox } from "../../components/Checkbox.tsx";
import { Dialog } from "../../components/Dialog.tsx";
import { fieldStyle } from "../../components/fieldStyle.ts";
import { Notice } from "../../components/Notice.tsx";
import { RadioChoices } from "../../components/RadioChoices.tsx";
import { TextField } from "../../components/TextField.tsx";
import { messageOf } from "../../lib/form.ts";
import { useChangeVariable } from "./queries.ts";
import { variableWords } from "./variableWords.ts";

const KINDS = [
  { value: "categorical", label: "Categories", detail: "Codes with labels; can be counted as affected, and split by." },
  { value: "numeric", label: "Numbers", detail: "Has a mean; split by in bands." },
] as const;

type Categories = VariableView["categories"];

/** One variable: what its codes mean; in a draft everything about it but the data can be mended. */
export function VariableDialog({
  variable,
  codebook,
  onClose,
}: {
  variable: VariableView;
  codebook: CodebookView;
  onClose: () => void;
}) {
  return (
    <Dialog title={variable.name} isOpen onClose={onClose}>
      <p className="mb-4 text-sm text-muted">{variableWords(variable)}</p>
      {codebook.can.update ? (
        <VariableForm variable={variable} releaseId={codebook.releaseId} onClose={onClose} />
      ) : (
        <VariableFacts variable={variable} onClose={onClose} />
      )}
    </Dialog>
  );
}

function VariableFacts({ variable, onClose }: { variable: VariableView; onClose: () => void }) {
  return (
    <>
      <p>{variable.label}</p>
      {variable.categories.length > 0 && (
        <table className="mt-4 w-full text-table">
          <caption className="sr-only">Categories of {variable.name}</caption>
          <thead>
            <tr className="border-b border-ink text-left">
              <th scope="col" className="py-1.5 pr-4 font-semibold">
                Code
              </th>
              <th scope="col" className="py-1.5 pr-4 font-semibold">
                Label
              </th>
              <th scope="col" className="py-1.5 font-semibold">
                Missing
              </th>
            </tr>
          </thead>
          <tbody>
            {variable.categories.map((category) => (
              <tr key={category.code} className="border-b border-line align-top">
                <td className="py-1.5 pr-4">{category.code}</td>
                <td className="py-1.5 pr-4">{category.label}</td>
                <td className="py-1.5">{category.isMissing ? "Yes" : ""}</td>
              </tr>
            ))}
          </tbody>
        </table>
      )}
      <div className="mt-6 text-right">
        <Button onPress={onClose}>Close</Button>
      </div>
    </>
  );
}

function VariableForm({ variable, releaseId, onClose }: { variable: VariableView; releaseId: string; onClose: () => void }) {
  const change = useChangeVariable(releaseId);
  const [label, setLabel] = useState(variable.label);
  const [kind, setKind] = useState(variable.kind);
  const [categories, setCategories] = useState<Categories>(variable.categories);
  const [newCode, setNewCode] = useState("");
  const save = () =>
    change.mutate(
      {
        id: variable.id,
        change: {
          label,
          kind,
          categories: categories.map(({ code, label: text, isMissing }) => ({ code, label: text, isMissing })),
        },
      },
      { onSuccess: onClose },
    );
  const set = (code: string, part: Partial<Categories[number]>) =>
    setCategories(categories.map((category) => (category.code === code ? { ...category, ...part } : category)));
  const mayAddCodes = variable.kind === "numeric";
  const add = () => {
    const code = newCode.trim();
    if (code === "" || categories.some((category) => category.code === code)) return;
    setCategories([...categories, { code, label: "", isMissing: true, respondents: null }]);
    setNewCode("");
  };
  return (
    <form
      noValidate
      className="space-y-5"
      onSubmit={(event) => {
        event.preventDefault();
        save();
      }}
    >
      {change.isError && <Notice kind="wrong">{messageOf(change.error)}</Notice>}
      <TextField label="Label" value={label} onChange={setLabel} autoFocus />
      {variable.kind !== "text" && (
        <RadioChoices label="Kind" choices={KINDS} value={kind === "text" ? "numeric" : kind} onChange={setKind} />
      )}
      {categories.length > 0 && <CategoryRows categories={categories} onChange={set} />}
      {mayAddCodes && (
        <div className="flex items-end gap-3">
          <TextField
            label="Another code with a meaning"
            value={newCode}
            onChange={setNewCode}
            description="Such as 99 for refused."
          />
          <Button onPress={add}>Add the code</Button>
        </div>
      )}
      <div className="flex flex-wrap justify-end gap-3">
        <Button onPress={onClose}>Leave it</Button>
        <Button type="submit" kind="primary" isPending={change.isPending}>
          Keep the changes
        </Button>
      </div>
    </form>
  );
}

function CategoryRows({
  categories,
  onChange,
}: {
  categories: Categories;
  onChange: (code: string, part: Partial<Categories[number]>) => void;
}) {
  return (
    <fieldset>
      <legend className={fieldStyle.label}>Codes</legend>
      <ul className="mt-2 max-h-72 space-y-3 overflow-y-auto pr-1">
        {categories.map((category) => (
          <li key={category.code} className="grid grid-cols-[4rem_1fr] items-center gap-x-3 gap-y-1">
            <span className="text-sm break-all">
              {category.code}
              {category.respondents !== null && (
                <span className="block text-xs text-muted tabular-nums">{formatCount(category.respondents)}</span>
              )}
            </span>
            <input
              aria-label={`Label of code ${category.code}`}
              className={fieldStyle.input}
              value={category.label}
              onChange={(event) => onChange(category.code, { label: event.target.value })}
            />
            <span />
            <Checkbox isSelected={category.isMissing} onChange={(isMissing) => onChange(category.code, { isMissing })}>
              <span className="text-sm">Stands for no answer</span>
            </Checkbox>
          </li>
        ))}
      </ul>
    </fieldset>
  );
}
