import { afterAll, beforeAll, expect, it } from "vitest";
import { createPerson } from "../factories/people.ts";
import { TEST_PASSWORD } from "../support/client.ts";
import { startTestApp, type TestApp } from "../support/testApp.ts";

let app: TestApp;
beforeAll(async () => {
  app = await startTestApp({ signInLimits: { perPerson: 3, perAddress: 100, windowMs: 60_000 } });
});
afterAll(async () => app.close());

it("refuses a sign-in after too many wrong tries, says how long to wait, and only for that person from there", async () => {
  const person = await createPerson(["planner"]);
  const other = await createPerson(["planner"]);
  const client = app.client();
  for (let i = 0; i < 3; i++)
    expect((await client.post("/api/session", { email: person.email, password: "wrong" })).status).toBe(401);
  const refused = await client.post("/api/session", { email: person.email, password: TEST_PASSWORD });
  expect(refused.status).toBe(429);
  expect(refused.text).toContain("Wait 1 minutes");
  await app.client().signIn(other.email);
});
