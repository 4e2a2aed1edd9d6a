import type { Sequelize } from "sequelize";
import { AppError } from "../errors.ts";
import { Release } from "../models/Release.ts";
import type { Designs } from "./design.ts";
import { record, type Actor } from "./ledger.ts";
import { readiness } from "./readiness.ts";

/**
 * Publishes a draft. An earlier published release of the same wave becomes superseded.
 * @throws {AppError} `conflict` naming the faults that block it, or when it is no draft any more.
 */
export async function publish(
  sequelize: Sequelize,
  designs: Designs,
  actor: NonNullable<Actor>,
  release: Release,
): Promise<void> {
  const { findings } = await readiness(designs, release);
  const faults = findings.filter(({ severity }) => severity === "fault");
  if (faults.length > 0) {
    const list = faults.map(({ message, remedy }) => `${message} ${remedy ?? ""}`.trim()).join(" ");
    throw new AppError("conflict", `It can't be published yet: ${list} Nothing was changed.`);
  }
  await sequelize.transaction(async (transaction) => {
    const version = release.version;
    await release.reload({ transaction, lock: true });
    if (release.status !== "draft") throw new AppError("conflict", "This release is published already.");
    if (release.version !== version)
      throw new AppError("conflict", "Codebook or design changed meanwhile. Look at the readiness again, then publish.");
    const earlier = await Release.findAll({
      where: { surveyId: release.surveyId, wave: release.wave, status: "published" },
      transaction,
      lock: true,
    });
    for (const old of earlier) await old.update({ status: "superseded" }, { transaction });
    await release.update({ status: "published", publishedAt: new Date(), publishedBy: actor.id }, { transaction });
    const replaced = earlier.length > 0 ? ` It takes the place of the release published before.` : "";
    await record(transaction, actor, {
      action: "release.published",
      surveyId: release.surveyId,
      subjectId: release.id,
      summary: `Published the release ${release.wave}.${replaced}`,
    });
  });
}

/** Removes a draft with its microdata. @throws {AppError} `conflict` unless it is a draft. */
export async function removeDraft(sequelize: Sequelize, actor: NonNullable<Actor>, release: Release): Promise<void> {
  await sequelize.transaction(async (transaction) => {
    await release.reload({ transaction, lock: true });
    if (release.status !== "draft") throw new AppError("conflict", "Only a draft can be removed. Nothing was changed.");
    await release.destroy({ transaction });
    await record(transaction, actor, {
      action: "release.removed",
      surveyId: release.surveyId,
      subjectId: release.id,
      summary: `Removed the draft of ${release.wave}.`,
    });
  });
}
