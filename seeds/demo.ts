import { randomUUID } from "node:crypto";
import { mkdtemp, rm } from "node:fs/promises";
import os from "node:os";
import path from "node:path";
import type { Sequelize } from "sequelize";
import { DesignInput } from "../shared/contracts/design.ts";
import type { Imports } from "../server/microdata/imports.ts";
import { Grant } from "../server/models/Grant.ts";
import type { Person } from "../server/models/Person.ts";
import { Release } from "../server/models/Release.ts";
import { Survey, SurveySteward } from "../server/models/Survey.ts";
import type { Designs } from "../server/services/design.ts";
import { record } from "../server/services/ledger.ts";
import { publish } from "../server/services/publication.ts";
import { seedAccounts } from "./accounts.ts";
import { writeReleaseFiles } from "./files.ts";
import { WAVES, type Wave } from "./population.ts";

const TITLE = "Tamarisk Coast Adult Health Survey";
const DESCRIPTION =
  "An invented survey of adults on the invented Tamarisk Coast: about 6,000 each wave, in five districts; villages, remote places and town blocks as PSUs; weights that correct for oversampled remote places and for who took part.";
const PILOT: Wave = "2026";
const GRANT_YEARS = 2;

const DESIGN = DesignInput.parse({ weight: "weight", strata: "stratum", psu: "psu", lonely: "centred" });

interface DemoServices {
  sequelize: Sequelize;
  imports: Imports;
  designs: Designs;
}

const GRANTS = [
  { email: "epidemiologist@perhundred.example", purpose: "Yearly report on health differences along the coast" },
  { email: "planner@perhundred.example", purpose: "Choosing where the next campaigns go" },
];

async function seedSurvey(sequelize: Sequelize, steward: Person): Promise<Survey> {
  const known = await Survey.findOne({ where: { title: TITLE } });
  if (known) return known;
  return sequelize.transaction(async (transaction) => {
    const id = randomUUID();
    const survey = await Survey.create({ id, title: TITLE, description: DESCRIPTION, createdAt: new Date() }, { transaction });
    await SurveySteward.create({ surveyId: id, personId: steward.id }, { transaction });
    await record(transaction, steward, {
      action: "survey.created",
      surveyId: id,
      subjectId: id,
      summary: `Created the survey “${TITLE}”.`,
    });
    return survey;
  });
}

async function seedRelease(
  { sequelize, imports, designs }: DemoServices,
  survey: Survey,
  steward: Person,
  wave: Wave,
): Promise<void> {
  const name = wave === PILOT ? `${wave} pilot` : wave;
  let release = await Release.findOne({ where: { surveyId: survey.id, wave: name } });
  if (!release) {
    const folder = await mkdtemp(path.join(os.tmpdir(), "perhundred-demo-"));
    try {
      const files = await writeReleaseFiles(folder, wave);
      const outcome = await imports.run({ surveyId: survey.id, wave: name, ...files, actor: steward });
      if (!("releaseId" in outcome)) throw new Error(`The demo's ${name} was refused: ${JSON.stringify(outcome.problems)}`);
      release = await Release.findByPk(outcome.releaseId);
    } finally {
      await rm(folder, { recursive: true, force: true });
    }
  }
  if (!release || wave === PILOT || release.status !== "draft") return;
  if (!release.design) await designs.declare(steward, release, DESIGN);
  await publish(sequelize, designs, steward, release);
}

async function seedGrants(
  sequelize: Sequelize,
  survey: Survey,
  steward: Person,
  people: ReadonlyMap<string, Person>,
): Promise<void> {
  const last = new Date();
  last.setUTCFullYear(last.getUTCFullYear() + GRANT_YEARS);
  for (const { email, purpose } of GRANTS) {
    const person = people.get(email);
    if (!person || (await Grant.findOne({ where: { surveyId: survey.id, personId: person.id } }))) continue;
    await sequelize.transaction(async (transaction) => {
      const grant = await Grant.create(
        {
          id: randomUUID(),
          surveyId: survey.id,
          personId: person.id,
          purpose,
          endsOn: last.toISOString().slice(0, 10),
          givenBy: steward.id,
          givenAt: new Date(),
        },
        { transaction },
      );
      await record(transaction, steward, {
        action: "grant.given",
        surveyId: survey.id,
        subjectId: grant.id,
        summary: `Gave ${person.name} access to “${TITLE}”: ${purpose}.`,
      });
    });
  }
}

/** Loads the demo: people, the survey with three published waves and a pilot that waits, and grants. What is there already stays; a start that broke off is gone on with. */
export async function seedDemo(services: DemoServices): Promise<void> {
  const people = await seedAccounts(services.sequelize);
  const steward = people.get("steward@perhundred.example");
  if (!steward) throw new Error("The demo's steward is missing.");
  const survey = await seedSurvey(services.sequelize, steward);
  for (const wave of WAVES) await seedRelease(services, survey, steward, wave);
  await seedGrants(services.sequelize, survey, steward, people);
}
