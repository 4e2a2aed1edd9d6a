import { randomUUID } from "node:crypto";
import { Grant } from "../../server/models/Grant.ts";
import type { Person } from "../../server/models/Person.ts";
import { Survey, SurveySteward } from "../../server/models/Survey.ts";

/** A survey of the given stewards. */
export async function createSurvey(stewards: readonly Person[], title = `Survey ${randomUUID().slice(0, 4)}`): Promise<Survey> {
  const survey = await Survey.create({ id: randomUUID(), title, description: "", createdAt: new Date() });
  await SurveySteward.bulkCreate(stewards.map(({ id }) => ({ surveyId: survey.id, personId: id })));
  return survey;
}

/** A grant that holds until the given day. */
export function createGrant(survey: Survey, person: Person, giver: Person, endsOn = "2999-12-31"): Promise<Grant> {
  return Grant.create({
    id: randomUUID(),
    surveyId: survey.id,
    personId: person.id,
    purpose: "To test",
    endsOn,
    givenBy: giver.id,
    givenAt: new Date(),
  });
}
