import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { LedgerEntry } from "../../server/models/LedgerEntry.ts";
import { Person, SessionRow } from "../../server/models/Person.ts";
import { PeopleView, NewSignInLink } from "../../shared/contracts/people.ts";
import { createPerson } from "../factories/people.ts";
import { TEST_PASSWORD } from "../support/client.ts";
import { startTestApp, type TestApp } from "../support/testApp.ts";

let app: TestApp;
beforeAll(async () => {
  app = await startTestApp();
});
afterAll(async () => app.close());

const SESSION = "perhundred";

describe("signing in", () => {
  it("answers the person, permissions and a token; the password's hash is memory-hard and never leaves", async () => {
    const person = await createPerson(["epidemiologist"]);
    const view = await app.client().signIn(person.email);
    expect(view).toMatchObject({
      person: { email: person.email },
      permissions: { ask: true, createSurvey: false, managePeople: false },
    });
    expect((await Person.findByPk(person.id))?.passwordHash).toMatch(/^\$argon2id\$/);
    expect(JSON.stringify(view)).not.toContain("argon2");
  });

  it("gives the same answer for an unknown e-mail, a wrong password and a deactivated person", async () => {
    const person = await createPerson(["planner"]);
    const gone = await createPerson(["planner"], { isActive: false });
    const client = app.client();
    const answers = [];
    for (const [email, password] of [
      ["nobody@perhundred.example", "x"],
      [person.email, "wrong"],
      [gone.email, TEST_PASSWORD],
    ])
      answers.push(await client.post("/api/session", { email, password }));
    expect(answers.map(({ status }) => status)).toEqual([401, 401, 401]);
    expect(new Set(answers.map(({ text }) => text)).size).toBe(1);
    expect(await LedgerEntry.count({ where: { action: "session.refused" } })).toBeGreaterThanOrEqual(3);
  });

  it("begins a session under a new id, so that one planted before is worth nothing", async () => {
    const person = await createPerson(["planner"]);
    const client = app.client();
    await client.signIn(person.email);
    const first = client.cookies.get(SESSION);
    await client.signIn(person.email);
    expect(client.cookies.get(SESSION)).not.toBe(first);
    const thief = app.client();
    thief.cookies.set(SESSION, first ?? "");
    expect((await thief.get("/api/session")).body).toMatchObject({ person: null });
  });

  it("marks the cookie so that no script and no other site gets it", async () => {
    const person = await createPerson(["planner"]);
    const answer = await app.client().send("POST", "/api/session", {
      headers: { "content-type": "application/json" },
      body: JSON.stringify({ email: person.email, password: TEST_PASSWORD }),
    });
    const cookie = answer.headers.getSetCookie().find((line) => line.startsWith(`${SESSION}=`));
    expect(cookie).toMatch(/HttpOnly/);
    expect(cookie).toMatch(/SameSite=Lax/);
  });

  it("ends on the server when signed out", async () => {
    const person = await createPerson(["planner"]);
    const client = app.client();
    await client.signIn(person.email);
    const kept = new Map(client.cookies);
    expect((await client.delete("/api/session")).status).toBe(204);
    const again = app.client();
    for (const [name, value] of kept) again.cookies.set(name, value);
    expect((await again.get("/api/surveys")).status).toBe(401);
    expect(await SessionRow.count({ where: { personId: person.id } })).toBe(0);
  });
});

describe("requests from other sites", () => {
  it("change nothing without the session's token", async () => {
    const steward = await createPerson(["steward"]);
    const client = app.client();
    await client.signIn(steward.email);
    const survey = { title: "Forged", description: "" };
    const send = (token?: string) =>
      client.send("POST", "/api/surveys", {
        headers: { "content-type": "application/json", ...(token === undefined ? {} : { "x-csrf-token": token }) },
        body: JSON.stringify(survey),
      });
    expect((await send()).status).toBe(403);
    expect((await send("made-up")).status).toBe(403);
    const other = app.client();
    await other.signIn((await createPerson(["steward"])).email);
    expect((await send(other.csrfToken)).status).toBe(403);
    expect((await send(client.csrfToken)).status).toBe(201);
  });

  it("can't sign anyone in", async () => {
    const person = await createPerson(["planner"]);
    const body = JSON.stringify({ email: person.email, password: TEST_PASSWORD });
    const foreign = await app.client().send("POST", "/api/session", {
      headers: { "content-type": "application/json", origin: "https://elsewhere.example" },
      body,
    });
    expect(foreign.status).toBe(403);
    const asForm = await app.client().send("POST", "/api/session", { headers: { "content-type": "text/plain" }, body });
    expect(asForm.status).toBe(403);
  });
});

describe("a one-time link", () => {
  async function invite() {
    const administrator = await createPerson(["administrator"]);
    const client = app.client();
    await client.signIn(administrator.email);
    const email = `invited-${Date.now()}-${Math.random()}@perhundred.example`;
    const made = NewSignInLink.parse((await client.post("/api/people", { name: "New Person", email, roles: ["planner"] })).body);
    return { client, made, email, path: `/api/sign-in-links/${new URL(made.link).pathname.split("/").at(-1) ?? ""}` };
  }

  it("lets its person choose a password and be signed in, once", async () => {
    const { path, email } = await invite();
    const newcomer = app.client();
    expect((await newcomer.get(path)).body).toMatchObject({ name: "New Person", email });
    expect((await newcomer.post(path, { password: "too short" })).body).toMatchObject({
      fields: { password: expect.any(String) as string },
    });
    const accepted = await newcomer.post(path, { password: "a quiet walk along the shore" });
    expect(accepted).toMatchObject({ status: 200, body: { person: { email } } });
    expect((await app.client().post(path, { password: "a quiet walk along the shore" })).status).toBe(404);
    await app.client().signIn(email, "a quiet walk along the shore");
  });

  it("is replaced by a newer one, whose making ends the person's sessions", async () => {
    const { client, path, made } = await invite();
    const newcomer = app.client();
    await newcomer.post(path, { password: "a quiet walk along the shore" });
    const session = await newcomer.get("/api/surveys");
    expect(session.status).toBe(200);
    const first = NewSignInLink.parse((await client.post(`/api/people/${made.person.id}/sign-in-link`)).body);
    expect((await newcomer.get("/api/surveys")).status).toBe(401);
    const second = NewSignInLink.parse((await client.post(`/api/people/${made.person.id}/sign-in-link`)).body);
    const pathOf = (link: string) => `/api/sign-in-links/${new URL(link).pathname.split("/").at(-1) ?? ""}`;
    expect((await app.client().get(pathOf(first.link))).status).toBe(404);
    expect((await app.client().get(pathOf(second.link))).status).toBe(200);
  });

  it("isn't kept: the database holds only its hash", async () => {
    const { made } = await invite();
    const token = new URL(made.link).pathname.split("/").at(-1) ?? "";
    const [rows] = await app.sequelize.query("SELECT * FROM sign_in_links");
    expect(JSON.stringify(rows)).not.toContain(token);
  });
});

describe("people", () => {
  it("lose their sessions at once when deactivated, and get back in when reactivated", async () => {
    const administrator = app.client();
    await administrator.signIn((await createPerson(["administrator"])).email);
    const person = await createPerson(["planner"]);
    const client = app.client();
    await client.signIn(person.email);
    expect((await administrator.patch(`/api/people/${person.id}`, { isActive: false })).status).toBe(200);
    expect((await client.get("/api/surveys")).status).toBe(401);
    await expect(app.client().signIn(person.email)).rejects.toThrow();
    await administrator.patch(`/api/people/${person.id}`, { isActive: true });
    await app.client().signIn(person.email);
  });

  it("can do at the very next request only what their new roles allow", async () => {
    const administrator = app.client();
    await administrator.signIn((await createPerson(["administrator"])).email);
    const person = await createPerson(["steward"]);
    const client = app.client();
    await client.signIn(person.email);
    expect((await client.post("/api/surveys", { title: "Before" })).status).toBe(201);
    await administrator.patch(`/api/people/${person.id}`, { roles: ["planner"] });
    expect((await client.post("/api/surveys", { title: "After" })).status).toBe(403);
  });

  it("have one account for an e-mail, and a name and a role at least", async () => {
    const administrator = app.client();
    await administrator.signIn((await createPerson(["administrator"])).email);
    const known = await createPerson(["planner"]);
    const taken = await administrator.post("/api/people", { name: "Twin", email: known.email.toUpperCase(), roles: ["planner"] });
    expect(taken).toMatchObject({ status: 409, body: { fields: { email: expect.any(String) as string } } });
    const bad = await administrator.post("/api/people", { name: " ", email: "no address", roles: [] });
    expect(bad).toMatchObject({
      status: 400,
      body: {
        fields: { name: expect.any(String) as string, email: expect.any(String) as string, roles: expect.any(String) as string },
      },
    });
    expect(PeopleView.parse((await administrator.get("/api/people")).body).people.length).toBeGreaterThan(2);
  });
});

it("changes a password for who knows the present one, and ends the other sessions", async () => {
  const person = await createPerson(["planner"]);
  const [here, elsewhere] = [app.client(), app.client()];
  await here.signIn(person.email);
  await elsewhere.signIn(person.email);
  expect((await here.put("/api/account/password", { current: "wrong", password: "a quiet walk along the shore" })).status).toBe(
    400,
  );
  expect(
    (await here.put("/api/account/password", { current: TEST_PASSWORD, password: "a quiet walk along the shore" })).status,
  ).toBe(204);
  expect((await here.get("/api/surveys")).status).toBe(200);
  expect((await elsewhere.get("/api/surveys")).status).toBe(401);
});
