import { afterAll, beforeAll, expect, it } from "vitest";
import { createPerson } from "../factories/people.ts";
import { startTestApp, type TestApp } from "../support/testApp.ts";

let app: TestApp;
beforeAll(async () => {
  app = await startTestApp();
});
afterAll(async () => app.close());

it("keeps one active administrator, even when two are changed at once", async () => {
  const [first, second] = [await createPerson(["administrator"]), await createPerson(["administrator"])];
  const [one, two] = [app.client(), app.client()];
  await one.signIn(first.email);
  await two.signIn(second.email);
  const answers = await Promise.all([
    one.patch(`/api/people/${second.id}`, { roles: ["planner"] }),
    two.patch(`/api/people/${first.id}`, { roles: ["planner"] }),
  ]);
  expect(answers.map(({ status }) => status).sort()).not.toEqual([200, 200]);
  const left = await app.sequelize.query("SELECT COUNT(*) AS n FROM person_roles WHERE role = 'administrator'");
  expect(left[0]).toEqual([{ n: 1 }]);
  const last = answers[0].status === 200 ? { client: one, id: first.id } : { client: two, id: second.id };
  const refused = await last.client.patch(`/api/people/${last.id}`, { roles: ["planner"] });
  expect(refused.status).toBe(409);
  expect((await last.client.patch(`/api/people/${last.id}`, { isActive: false })).status).not.toBe(200);
});
