import { screen, waitFor } from "@testing-library/react";
import { describe, expect, it } from "vitest";
import { renderApp } from "./renderApp.tsx";
import { refuse, serveApi, sessionOf, signedOut } from "./serveApi.ts";

describe("signing in", () => {
  it("sends a stranger to sign in and back to the page they asked for", async () => {
    let session = signedOut;
    const { requests } = serveApi({
      "GET /api/session": () => ({ body: session }),
      "POST /api/session": () => {
        session = sessionOf("administrator");
        return { body: session };
      },
      "GET /api/people": { people: [] },
    });
    const { user, address } = renderApp("/people");
    await screen.findByRole("heading", { name: "Sign in" });
    expect(address()).toBe("/sign-in?to=%2Fpeople");
    await user.type(screen.getByLabelText("E-mail"), "kit@perhundred.example");
    await user.type(screen.getByLabelText("Password"), "tamarisk by the sea{Enter}");
    await screen.findByRole("heading", { name: "People" });
    expect(address()).toBe("/people");
    expect(requests.find(({ method }) => method === "POST")?.body).toEqual({
      email: "kit@perhundred.example",
      password: "tamarisk by the sea",
    });
  });

  it("names what is missing before anything is sent, and says why the server refused", async () => {
    const { requests } = serveApi({
      "GET /api/session": signedOut,
      "POST /api/session": () => refuse(401, "E-mail address and password don't fit an active account."),
    });
    const { user } = renderApp("/sign-in");
    await user.click(await screen.findByRole("button", { name: "Sign in" }));
    expect(await screen.findByText("Give your e-mail address.")).toBeVisible();
    expect(requests.some(({ method }) => method === "POST")).toBe(false);
    await user.type(screen.getByLabelText("E-mail"), "kit@perhundred.example");
    await user.type(screen.getByLabelText("Password"), "wrong{Enter}");
    expect(await screen.findByRole("alert")).toHaveTextContent("don't fit an active account");
    expect(screen.getByLabelText("E-mail")).toHaveValue("kit@perhundred.example");
    expect(screen.getByLabelText("Password")).toHaveValue("");
  });

  it("goes to no other site, whatever the address says", async () => {
    serveApi({ "GET /api/session": sessionOf("planner"), "GET /api/surveys": { surveys: [] } });
    const { address } = renderApp("/sign-in?to=//elsewhere.example/");
    await waitFor(() => expect(address()).toBe("/"));
  });
});

it("says what a used link means and what to do", async () => {
  serveApi({ "GET /api/session": signedOut, "GET /api/sign-in-links/:token": () => refuse(404, "Gone.") });
  renderApp("/welcome/used");
  expect(await screen.findByRole("heading", { name: "This link no longer works" })).toBeVisible();
  expect(screen.getByText(/Ask an administrator/)).toBeVisible();
});
