import { screen, within } from "@testing-library/react";
import { describe, expect, it } from "vitest";
import type { CodebookView } from "../../shared/contracts/codebook.ts";
import type { ReleaseView, SurveyView } from "../../shared/contracts/holdings.ts";
import type { ImportView } from "../../shared/contracts/imports.ts";
import type { ReadinessView } from "../../shared/contracts/readiness.ts";
import { renderApp } from "./renderApp.tsx";
import { refuse, serveApi, sessionOf, type ApiTable } from "./serveApi.ts";

const id = (n: number) => `0b0e5f5e-6f2a-4c39-9f0a-00000000000${n}`;
const RELEASE: ReleaseView = {
  id: id(1),
  surveyId: id(2),
  wave: "2026 pilot",
  status: "draft",
  respondents: 817,
  variables: 2,
  hasDesign: false,
  createdAt: "2026-12-01T10:00:00.000Z",
  publishedAt: null,
  importId: id(3),
  can: { import: true, design: true, publish: true, ask: false, remove: true },
  surveyTitle: "Coast Survey",
  checksum: "ab".repeat(32),
  publishedBy: null,
};
const SURVEY: SurveyView = {
  id: id(2),
  title: "Coast Survey",
  description: "",
  stewards: [{ id: id(4), name: "Mara Tellin" }],
  releases: [],
  grantEndsOn: null,
  can: { update: true, import: true, manageAccess: true },
};
const CODEBOOK: CodebookView = {
  releaseId: id(1),
  respondents: 817,
  designVariables: [],
  variables: [
    {
      id: id(5),
      name: "weight",
      label: "Weight",
      kind: "numeric",
      categories: [],
      missingShare: 0,
      minimum: 98.5,
      maximum: 1171.25,
      isWhole: false,
      distinct: 191,
    },
    {
      id: id(6),
      name: "stratum",
      label: "Stratum",
      kind: "categorical",
      categories: [{ code: "1", label: "North", isMissing: false, respondents: 817 }],
      missingShare: 0.015,
      minimum: null,
      maximum: null,
      isWhole: true,
      distinct: 1,
    },
  ],
  can: { update: true },
};
const READINESS: ReadinessView = {
  releaseId: id(1),
  respondents: 817,
  sumOfWeights: 175_000,
  strata: 15,
  psus: 55,
  degreesOfFreedom: 40,
  lonelyPsus: 3,
  weight: {
    minimum: 98.5,
    median: 200,
    maximum: 1171.25,
    kishEffect: 1.3,
    zero: 0,
    histogram: [
      { from: 50, to: 100, respondents: 17 },
      { from: 100, to: 150, respondents: 800 },
    ],
  },
  missing: [{ variable: "distress", label: "Distress score", share: 0.44 }],
  findings: [],
  can: { publish: true },
};
const common: ApiTable = {
  "GET /api/session": sessionOf("steward"),
  "GET /api/surveys/:id": SURVEY,
  "GET /api/releases/:id": RELEASE,
  "GET /api/releases/:id/codebook": CODEBOOK,
};

describe("bringing in", () => {
  const running: ImportView = {
    id: id(3),
    surveyId: id(2),
    releaseId: null,
    wave: "2027",
    status: "running",
    stage: "Reading and checking",
    bytesDone: 25,
    bytesTotal: 100,
    rows: 1200,
    problems: [],
    startedAt: "2026-12-01T10:00:00.000Z",
    endedAt: null,
    can: { cancel: true },
  };

  it("shows the progress of an import that runs, and cancels it", async () => {
    const { requests } = serveApi({
      ...common,
      "GET /api/surveys/:id/imports": { imports: [running] },
      "DELETE /api/imports/:id": running,
    });
    const { user } = renderApp(`/surveys/${id(2)}`);
    const bar = await screen.findByRole("progressbar", { name: "2027: Reading and checking" });
    expect(bar).toHaveAttribute("aria-valuenow", "25");
    expect(screen.getByText(/1,200 rows/)).toBeVisible();
    await user.click(screen.getByRole("button", { name: "Cancel" }));
    expect(requests.some(({ method, path }) => method === "DELETE" && path === `/api/imports/${id(3)}`)).toBe(true);
  });

  it("reports what was wrong with a file: kind, count, and the first places", async () => {
    const failed: ImportView = {
      ...running,
      status: "failed",
      endedAt: "2026-12-01T10:01:00.000Z",
      problems: [
        {
          kind: "not-a-number",
          severity: "error",
          file: "microdata",
          message: "A numeric variable holds something that is no number.",
          count: 12,
          first: [{ line: 7, column: "weight", value: "two" }],
        },
      ],
      can: { cancel: false },
    };
    serveApi({ ...common, "GET /api/surveys/:id/imports": { imports: [failed] } });
    renderApp(`/surveys/${id(2)}`);
    expect(await screen.findByText("2027 was not brought in")).toBeVisible();
    expect(screen.getByText(/12 places/)).toBeVisible();
    expect(screen.getByText("line 7, column weight: “two”")).toBeVisible();
    expect(screen.getByText("and 11 more")).toBeVisible();
  });

  it("names what is missing before anything is sent", async () => {
    const { requests } = serveApi({ ...common, "GET /api/surveys/:id/imports": { imports: [] } });
    const { user } = renderApp(`/surveys/${id(2)}`);
    await user.click(await screen.findByRole("button", { name: "Bring in the release" }));
    expect(screen.getByText("Name the wave, such as 2025.")).toBeVisible();
    expect(screen.getByText("Choose the file that holds the microdata.")).toBeVisible();
    expect(requests.some(({ method }) => method === "POST")).toBe(false);
  });
});

describe("the design", () => {
  const view = { releaseId: id(1), design: null, floor: { respondents: 5, affected: 0, unaffected: 0 }, can: { update: true } };

  it("offers each variable with what it holds, and declares what was chosen", async () => {
    const { requests } = serveApi({ ...common, "GET /api/releases/:id/design": view, "PUT /api/releases/:id/design": view });
    const { user } = renderApp(`/releases/${id(1)}/design`);
    await user.click(await screen.findByRole("combobox", { name: "Weight" }));
    const option = await screen.findByRole("option", { name: "weight" });
    expect(option).toHaveTextContent("numbers 98.50 to 1,171, 191 different, none missing");
    await user.click(option);
    await user.click(screen.getByRole("combobox", { name: "Stratum" }));
    await user.click(await screen.findByRole("option", { name: "stratum" }));
    await user.click(screen.getByRole("radio", { name: /Average/ }));
    await user.click(screen.getByRole("button", { name: "Declare the design" }));
    expect(await screen.findByText("The design is declared")).toBeVisible();
    expect(requests.find(({ method }) => method === "PUT")?.body).toMatchObject({
      weight: "weight",
      strata: "stratum",
      psu: null,
      lonely: "average",
      minimums: { respondents: 10, affected: 3, unaffected: 3 },
    });
  });

  it("puts what the server found wrong onto its field", async () => {
    serveApi({
      ...common,
      "GET /api/releases/:id/design": view,
      "PUT /api/releases/:id/design": () =>
        refuse(400, "No.", { "minimums.respondents": "This installation allows no less than 5." }),
    });
    const { user } = renderApp(`/releases/${id(1)}/design`);
    await user.clear(await screen.findByLabelText("Fewest respondents"));
    await user.type(screen.getByLabelText("Fewest respondents"), "2");
    await user.click(screen.getByRole("button", { name: "Declare the design" }));
    expect(await screen.findByText("This installation allows no less than 5.")).toBeVisible();
    expect(screen.getByLabelText("Fewest respondents")).toHaveValue("2");
  });
});

describe("readiness", () => {
  it("keeps a release with a fault from being published and says how to mend it", async () => {
    const fault = {
      kind: "weight-missing",
      severity: "fault" as const,
      message: "3 respondents have no weight.",
      remedy: "Bring the release in again with a weight for everyone.",
      count: 3,
    };
    serveApi({ ...common, "GET /api/releases/:id/readiness": { ...READINESS, findings: [fault], can: { publish: false } } });
    renderApp(`/releases/${id(1)}/readiness`);
    expect(await screen.findByText("3 respondents have no weight.")).toBeVisible();
    expect(screen.getByText(/Bring the release in again/)).toBeVisible();
    expect(screen.getByRole("button", { name: "Publish" })).toBeDisabled();
  });

  it("publishes after saying what that means; the histogram's counts stand in a table too", async () => {
    const { requests } = serveApi({
      ...common,
      "GET /api/releases/:id/readiness": READINESS,
      "POST /api/releases/:id/publication": { ...RELEASE, status: "published" },
    });
    const { user } = renderApp(`/releases/${id(1)}/readiness`);
    await user.click(await screen.findByText("The same as a table"));
    expect(
      within(screen.getByRole("table", { name: "Respondents by weight" })).getByRole("row", { name: "100 to 150 800" }),
    ).toBeVisible();
    await user.click(screen.getByRole("button", { name: "Publish" }));
    const dialog = within(await screen.findByRole("alertdialog"));
    expect(dialog.getByText(/can ask of it from then on/)).toBeVisible();
    expect(requests.some(({ method }) => method === "POST")).toBe(false);
    await user.click(dialog.getByRole("button", { name: "Publish" }));
    expect(requests.some(({ path }) => path === `/api/releases/${id(1)}/publication`)).toBe(true);
  });
});

describe("the codebook", () => {
  it("is searched by any words, and a draft's variable is mended", async () => {
    const { requests } = serveApi({ ...common, "PATCH /api/releases/:id/codebook/:variableId": CODEBOOK.variables[1]! });
    const { user, address } = renderApp(`/releases/${id(1)}/codebook`);
    await user.type(await screen.findByLabelText("Find a variable"), "north");
    expect(await screen.findByText("1 variable of 2")).toBeVisible();
    expect(address()).toContain("find=north");
    await user.click(screen.getByRole("button", { name: "Change stratum" }));
    const dialog = within(await screen.findByRole("dialog"));
    await user.clear(dialog.getByLabelText("Label of code 1"));
    await user.type(dialog.getByLabelText("Label of code 1"), "Northern coast");
    await user.click(dialog.getByRole("button", { name: "Keep the changes" }));
    expect(requests.find(({ method }) => method === "PATCH")?.body).toMatchObject({
      categories: [{ code: "1", label: "Northern coast", isMissing: false }],
    });
  });
});
