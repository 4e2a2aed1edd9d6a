import { screen, within } from "@testing-library/react";
import { describe, expect, it } from "vitest";
import type { PersonView } from "../../shared/contracts/people.ts";
import { renderApp } from "./renderApp.tsx";
import { refuse, serveApi, sessionOf } from "./serveApi.ts";

const PERSON: PersonView = {
  id: "0b0e5f5e-6f2a-4c39-9f0a-000000000002",
  name: "Odo Varga",
  email: "odo@perhundred.example",
  roles: ["epidemiologist"],
  isActive: true,
  hasPassword: true,
  lastSignInAt: null,
  can: { update: true, deactivate: true },
};
const LINK = { person: PERSON, link: "http://localhost/welcome/only-once", expiresAt: "2026-12-04T12:00:00.000Z" };
const table = { "GET /api/session": sessionOf("administrator"), "GET /api/people": { people: [PERSON] } };

describe("People", () => {
  it("adds a person and shows their link until it was handed over", async () => {
    const { requests } = serveApi({ ...table, "POST /api/people": () => ({ status: 201, body: LINK }) });
    const { user } = renderApp("/people");
    await user.click(await screen.findByRole("button", { name: "Add a person" }));
    const dialog = within(await screen.findByRole("dialog"));
    await user.type(dialog.getByLabelText("Name"), "Odo Varga");
    await user.type(dialog.getByLabelText("E-mail"), "odo@perhundred.example");
    await user.click(dialog.getByRole("checkbox", { name: /Epidemiologist/ }));
    await user.click(dialog.getByRole("button", { name: "Add and make a link" }));
    expect(await screen.findByText(LINK.link)).toBeVisible();
    const sent = requests.find(({ method }) => method === "POST");
    expect(sent?.body).toEqual({ name: "Odo Varga", email: "odo@perhundred.example", roles: ["epidemiologist"] });
    expect(sent?.headers.get("x-csrf-token")).toBe("csrf-of-the-test");
    await user.click(screen.getByRole("button", { name: "Done, hide it" }));
    expect(screen.queryByText(LINK.link)).not.toBeInTheDocument();
  });

  it("puts what the server found wrong onto its field, and keeps what was typed", async () => {
    serveApi({ ...table, "POST /api/people": () => refuse(409, "Nothing was added.", { email: "This address is taken." }) });
    const { user } = renderApp("/people");
    await user.click(await screen.findByRole("button", { name: "Add a person" }));
    const dialog = within(await screen.findByRole("dialog"));
    await user.type(dialog.getByLabelText("Name"), "Odo Varga");
    await user.type(dialog.getByLabelText("E-mail"), "odo@perhundred.example");
    await user.click(dialog.getByRole("checkbox", { name: /Epidemiologist/ }));
    await user.click(dialog.getByRole("button", { name: "Add and make a link" }));
    expect(await dialog.findByText("This address is taken.")).toBeVisible();
    expect(dialog.getByLabelText("Name")).toHaveValue("Odo Varga");
  });

  it("says what deactivating does before it is done", async () => {
    const { requests } = serveApi({ ...table, "PATCH /api/people/:id": { ...PERSON, isActive: false } });
    const { user } = renderApp("/people");
    await user.click(await screen.findByRole("button", { name: "Change Odo Varga" }));
    await user.click(await screen.findByRole("menuitem", { name: "Deactivate" }));
    const dialog = within(await screen.findByRole("alertdialog"));
    expect(dialog.getByText(/sessions end at once/)).toBeVisible();
    await user.click(dialog.getByRole("button", { name: "Deactivate" }));
    expect(requests.find(({ method }) => method === "PATCH")?.body).toEqual({ isActive: false });
  });
});
