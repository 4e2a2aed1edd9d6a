import { Piscina } from "piscina";
import type { Sequelize } from "sequelize";
import type { Design } from "../../shared/contracts/design.ts";
import type { Config } from "../config.ts";
import { AppError } from "../errors.ts";
import type { ColumnCache } from "../microdata/columnCache.ts";
import type { CodebookVariable } from "../microdata/codebook.ts";
import { designVariables } from "../microdata/designData.ts";
import type designWork from "../microdata/designWork.ts";
import type { DesignWork } from "../microdata/designWork.ts";
import type { ReadinessFacts } from "../microdata/readinessFacts.ts";
import { expandPattern } from "../microdata/replicates.ts";
import { readSegments } from "../microdata/segmentRows.ts";
import { sha256 } from "../microdata/segments.ts";
import { workerOptions } from "../microdata/workers.ts";
import { Layout } from "../models/Column.ts";
import type { Release } from "../models/Release.ts";
import { loadCodebook } from "./codebook.ts";
import { record, type Actor } from "./ledger.ts";

const FACTS = "readiness";

/** Declares designs of draft releases and tells what their checks found. */
export interface Designs {
  /** @throws {AppError} `invalid` naming every field that doesn't fit the release; `conflict` unless it is a draft. */
  declare(actor: NonNullable<Actor>, release: Release, design: Design): Promise<void>;
  /** What was found when the design was declared; null where none is. */
  facts(release: Release): Promise<ReadinessFacts | null>;
  close(): Promise<void>;
}

type Fields = Record<string, string>;

function checkNames(design: Design, variables: readonly CodebookVariable[], fields: Fields): void {
  const byName = new Map(variables.map((variable) => [variable.name, variable]));
  const check = (path: string, name: string | null | undefined, isNumber: boolean) => {
    if (name === null || name === undefined) return;
    const variable = byName.get(name);
    if (!variable) fields[path] = `There is no variable “${name}” in this release.`;
    else if (isNumber && variable.storage === "text") fields[path] = `“${name}” holds text; this needs numbers.`;
  };
  const checkAll = (path: string, names: string | string[] | null, isNumber: boolean) => {
    if (Array.isArray(names)) names.forEach((name, i) => check(`${path}.${i}`, name, isNumber));
    else check(path, names, isNumber);
  };
  check("weight", design.weight, true);
  check("strata", design.strata, false);
  checkAll("psu", design.psu, false);
  checkAll("populationSize", design.populationSize, true);
  if (Array.isArray(design.populationSize) && design.populationSize.length === 2 && design.psu === null)
    fields.populationSize = "Two population sizes need a PSU: the first is of PSUs, the second within them.";
  if (Array.isArray(design.psu) && new Set(design.psu).size < design.psu.length)
    fields.psu = "The two stages can't be the same variable.";
}

function checkReplicates(design: Design, names: readonly string[], fields: Fields): void {
  const { replicates } = design;
  if (!replicates) return;
  const found = expandPattern(replicates.pattern, names);
  if (!found)
    fields["replicates.pattern"] =
      "No columns fit this pattern. Name the first and the last, such as repwt1–repwt80; all between must be there.";
  else if (found.length < 2) fields["replicates.pattern"] = "A variance needs at least two replicate weights.";
  else if (Array.isArray(replicates.replicateScales) && replicates.replicateScales.length !== found.length)
    fields["replicates.replicateScales"] =
      `There are ${found.length} replicate weights and ${replicates.replicateScales.length} factors.`;
  if (replicates.method === "JKn" && replicates.replicateScales === null)
    fields["replicates.replicateScales"] = "JKn needs each replicate's factor (PSUs − 1)/PSUs of its stratum.";
  if (replicates.method === "other" && replicates.scale === null)
    fields["replicates.scale"] = "Give the factor before the sum of squares.";
  if (replicates.method === "Fay" && replicates.fay === null) fields["replicates.fay"] = "Give Fay's factor, such as 0.3.";
}

function checkMinimums(design: Design, floor: Config["floor"], fields: Fields): void {
  for (const name of ["respondents", "affected", "unaffected"] as const)
    if (design.minimums[name] < floor[name]) fields[`minimums.${name}`] = `This installation allows no less than ${floor[name]}.`;
}

/** @throws {AppError} `invalid` naming every field that doesn't fit. */
function checkDesign(design: Design, variables: readonly CodebookVariable[], floor: Config["floor"]): void {
  const fields: Fields = {};
  checkNames(design, variables, fields);
  checkReplicates(
    design,
    variables.map(({ name }) => name),
    fields,
  );
  checkMinimums(design, floor, fields);
  const [first] = Object.values(fields);
  if (first !== undefined) throw new AppError("invalid", `${first} The design wasn't changed.`, fields);
}

/** Works in worker threads. @param parts.columns Told to let go of a release whose design changed. */
export function createDesigns(parts: { config: Config; sequelize: Sequelize; columns: ColumnCache }): Designs {
  const pool = new Piscina<DesignWork, ReturnType<typeof designWork>>({
    ...workerOptions(new URL("../microdata/designWork.ts", import.meta.url)),
    minThreads: 0,
    maxThreads: 1,
    idleTimeout: 10_000,
  });
  return {
    async declare(actor, release, design) {
      if (release.status !== "draft")
        throw new AppError("conflict", "A published release keeps its design. Bring in a new release to change it.");
      const variables = await loadCodebook(release);
      checkDesign(design, variables, parts.config.floor);
      const names = variables.map(({ name }) => name);
      const replicates = new Set(design.replicates ? expandPattern(design.replicates.pattern, names) : []);
      const columns: DesignWork["columns"] = [];
      for (const name of designVariables(design, names)) {
        const variable = variables.find((known) => known.name === name)!;
        columns.push({ variable, segments: await readSegments(variable.id), isReplicate: replicates.has(name) });
      }
      const { layout, facts } = await pool.run({ design, rows: release.respondents, columns });
      const kept: Record<string, Uint8Array> = { ...layout, [FACTS]: Buffer.from(JSON.stringify(facts)) };
      await parts.sequelize.transaction(async (transaction) => {
        await release.reload({ transaction, lock: true });
        if (release.status !== "draft")
          throw new AppError("conflict", "The release was published meanwhile and keeps its design.");
        await Layout.destroy({ where: { releaseId: release.id }, transaction });
        for (const [part, bytes] of Object.entries(kept))
          await Layout.create(
            { releaseId: release.id, part, bytes: Buffer.from(bytes), checksum: sha256(bytes) },
            { transaction },
          );
        await release.update({ design, layoutAt: new Date(), version: release.version + 1 }, { transaction });
        await record(transaction, actor, {
          action: "design.declared",
          surveyId: release.surveyId,
          subjectId: release.id,
          summary: `Declared the design of ${release.wave}.`,
        });
      });
      parts.columns.forget(release.id);
    },
    async facts(release) {
      if (!release.design) return null;
      const row = await Layout.findOne({ where: { releaseId: release.id, part: FACTS }, raw: true });
      if (!row) return null;
      // Written above from the same type.
      return JSON.parse(row.bytes.toString("utf8")) as ReadinessFacts;
    },
    async close() {
      await pool.destroy();
    },
  };
}
