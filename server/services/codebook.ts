import type { Sequelize } from "sequelize";
import type { VariableChange } from "../../shared/contracts/codebook.ts";
import { AppError } from "../errors.ts";
import { numberOfCode, type CodebookVariable } from "../microdata/codebook.ts";
import { assembleColumn } from "../microdata/columns.ts";
import { readSegments } from "../microdata/segmentRows.ts";
import type { Release } from "../models/Release.ts";
import { Category, Variable } from "../models/Variable.ts";
import type { Reader } from "../policies/policy.ts";
import { record } from "./ledger.ts";

/** A release's variables with their categories, in order. */
export function loadVariables(releaseId: string): Promise<Variable[]> {
  return Variable.findAll({
    where: { releaseId },
    include: "categories",
    order: [
      ["position", "ASC"],
      [{ model: Category, as: "categories" }, "position", "ASC"],
    ],
  });
}

/** A release's codebook as questions and designs use it. */
export async function loadCodebook(release: Pick<Release, "id">): Promise<CodebookVariable[]> {
  const variables = await loadVariables(release.id);
  return variables.map(({ id, name, label, kind, storage, isWhole, minimum, maximum, categories }) => ({
    id,
    name,
    label,
    kind,
    storage,
    isWhole,
    minimum,
    maximum,
    categories: (categories ?? []).map(({ position, code, label: text, isMissing }) => ({
      position,
      code,
      label: text,
      isMissing,
    })),
  }));
}

function refuse(field: string, message: string): AppError {
  return new AppError("invalid", `${message} Nothing was changed.`, { [field]: message });
}

/** Whether a variable's column can serve as another kind. */
function checkKind(variable: Variable, kind: NonNullable<VariableChange["kind"]>, categories: readonly Category[]): void {
  if (kind === variable.kind) return;
  if (variable.storage === "text" || kind === "text")
    throw refuse(
      "kind",
      kind === "text"
        ? "A variable with codes or numbers can't become text."
        : "Text can't be counted. Bring the release in again with a codebook that names its codes.",
    );
  if (
    kind === "numeric" &&
    variable.storage === "code" &&
    categories.some(({ code, isMissing }) => !isMissing && Number.isNaN(numberOfCode(code)))
  )
    throw refuse("kind", "Some codes are no numbers. Mark them as missing first.");
  if (kind === "categorical" && variable.storage === "number" && !categories.some(({ isMissing }) => !isMissing))
    throw refuse("kind", "Name its categories first: a number without named codes has nothing to split by.");
}

/** Fills in how many respondents have each of these codes of a numeric variable. */
async function countRespondents(release: Release, variable: Variable, categories: readonly Category[]): Promise<void> {
  const { values } = assembleColumn(variable.storage, await readSegments(variable.id), release.respondents);
  const byNumber = new Map(categories.map((category) => [numberOfCode(category.code), category]));
  const counts = new Map<Category, number>();
  for (const value of values) {
    const category = byNumber.get(value);
    if (category) counts.set(category, (counts.get(category) ?? 0) + 1);
  }
  for (const category of categories) category.set({ respondents: counts.get(category) ?? 0 });
}

/**
 * Changes a draft's variable. Categories not named keep what they have; a numeric variable may gain named codes.
 * @returns The variable as it is now. @throws {AppError} `invalid` where the change doesn't fit the column.
 */
export async function changeVariable(
  sequelize: Sequelize,
  reader: Reader,
  release: Release,
  variable: Variable,
  change: VariableChange,
): Promise<void> {
  const categories = [...(variable.categories ?? [])];
  const added: Category[] = [];
  for (const wanted of change.categories ?? []) {
    const known = categories.find(({ code }) => code === wanted.code);
    if (known) known.set({ label: wanted.label, isMissing: wanted.isMissing });
    else if (variable.storage === "code") throw refuse("categories", `There is no code “${wanted.code}” in this variable.`);
    else if (Number.isNaN(numberOfCode(wanted.code)))
      throw refuse("categories", `“${wanted.code}” is no number, so no respondent of this variable can have it.`);
    else {
      const position = Math.max(-1, ...categories.map((category) => category.position)) + 1;
      const category = Category.build({
        variableId: variable.id,
        position,
        code: wanted.code,
        label: wanted.label,
        isMissing: wanted.isMissing,
        respondents: 0,
      });
      categories.push(category);
      added.push(category);
    }
  }
  if (change.kind) checkKind(variable, change.kind, categories);
  if (added.length > 0) await countRespondents(release, variable, added);
  await sequelize.transaction(async (transaction) => {
    await variable.update({ label: change.label ?? variable.label, kind: change.kind ?? variable.kind }, { transaction });
    for (const category of categories) if (added.includes(category) || category.changed()) await category.save({ transaction });
    await release.increment("version", { transaction });
    await record(transaction, reader, {
      action: "codebook.changed",
      surveyId: release.surveyId,
      subjectId: release.id,
      summary: `Changed the codebook of ${release.wave}: ${variable.name}.`,
    });
  });
}
