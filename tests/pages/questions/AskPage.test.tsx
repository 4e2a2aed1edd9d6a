import { screen, waitFor, within } from "@testing-library/react";
import { beforeEach, describe, expect, it, vi } from "vitest";
import { Question } from "../../../shared/contracts/questions.ts";
import { renderApp } from "../renderApp.tsx";
import { refuse, serveApi, sessionOf, type ApiTable } from "../serveApi.ts";
import { codebook, olderReleaseId, releaseId, surveys, tableOf } from "./askFixtures.ts";

const AGES = "age(18..24;25..34;35..44;45..54;55..64;65..)";
const ASKED = `/ask?release=${releaseId}&outcome=smoking:1&down=${AGES}&across=sex&than=all`;

const api = (changes: ApiTable = {}): ApiTable => ({
  "GET /api/session": sessionOf("epidemiologist"),
  "GET /api/surveys": surveys,
  "GET /api/releases/:id/codebook": codebook,
  "POST /api/tables": ({ body }) => ({ body: tableOf(Question.parse(body)) }),
  "POST /api/tables/downloads": () => ({ status: 204, body: null }),
  ...changes,
});

const sentence = async () => (await screen.findByRole("heading", { level: 1 })).textContent;
const grid = () => screen.findByRole("grid");
const reading = () => screen.getByRole("region", { name: /^(Everyone|.*\d.*|Women|Men)/u });

describe("a question in the address", () => {
  beforeEach(() => void serveApi(api()));

  it("is read as one sentence, which is the window's title too", async () => {
    renderApp(ASKED);
    await grid();
    expect(await sentence()).toBe(
      "In Tamarisk Coast Adult Health Survey, 2025, of every 100 people, how many have Smoking now: Daily? Split by Age in years in bands down and Sex across. Compared with everyone.",
    );
    await waitFor(() => expect(document.title).toMatch(/^In Tamarisk Coast.*Compared with everyone\. · Perhundred$/u));
  });

  it("is answered by a grid with a caption, headers of rows and columns, and totals", async () => {
    renderApp(ASKED);
    const table = within(await grid());
    expect(table.getAllByRole("columnheader").map((header) => header.textContent)).toEqual([
      "Age in years",
      "Women",
      "Men",
      "Everyone",
    ]);
    expect(table.getAllByRole("rowheader").map((header) => header.textContent)).toEqual([
      "18–24",
      "25–34",
      "35–44",
      "45–54",
      "55–64",
      "65 and over",
      "Everyone",
    ]);
    expect((await grid()).querySelector("caption")).toHaveTextContent("how many have Smoking now: Daily?");
  });

  it("shows estimate, interval, difference with its direction in words, and respondents", async () => {
    renderApp(ASKED);
    const cells = within(await grid()).getAllByRole("gridcell");
    expect(cells[0]).toHaveTextContent(/^36\.9▲ higher, \+1632\.7 to 41\.9n 249with caution$/u);
    expect(cells[1]).toHaveTextContent("no difference shown, 0");
    expect(cells[10]).toHaveTextContent("lower, −13.9");
  });

  it("says that a figure is withheld, and why, without any number", async () => {
    const { user } = renderApp(ASKED);
    const row = within(await grid()).getByRole("row", { name: /65 and over/u });
    const [, men, everyone] = within(row).getAllByRole("gridcell");
    expect(men).toHaveTextContent(/^withheldtoo few respondents$/u);
    expect(everyone).toHaveTextContent(/^withheldwould reveal another$/u);
    if (men) await user.click(men);
    const panel = screen.getByRole("region", { name: "65 and over, Men" });
    expect(panel).toHaveTextContent("It isn't small because it is withheld.");
    expect(panel).not.toHaveTextContent(/respondents\d|Degrees of freedom/u);
  });

  it("reads the chosen cell out in natural frequencies; arrows move the choice", async () => {
    const { user } = renderApp(ASKED);
    const [first] = within(await grid()).getAllByRole("gridcell");
    if (first) await user.click(first);
    expect(screen.getByRole("region", { name: "18–24, Women" })).toHaveTextContent(
      "Of every 100 people with Age in years: 18–24 and Sex: Women, about 37 have Smoking now: Daily (33 to 42). That is 16 more than among everyone (10 to 21 more).",
    );
    await user.keyboard("{ArrowDown}{ArrowRight}");
    expect(screen.getByRole("region", { name: "25–34, Men" })).toBeInTheDocument();
    await user.keyboard("{Control>}{End}{/Control}");
    expect(reading()).toHaveAccessibleName("Everyone");
  });

  it("sorts rows by a column, with withheld figures last and everyone below", async () => {
    const { user } = renderApp(ASKED);
    await user.click(within(await grid()).getByRole("button", { name: "Men" }));
    const names = within(await grid())
      .getAllByRole("rowheader")
      .map((header) => header.textContent);
    expect(names).toEqual(["18–24", "25–34", "55–64", "35–44", "45–54", "65 and over", "Everyone"]);
    expect(within(await grid()).getByRole("columnheader", { name: "Men" })).toHaveAttribute("aria-sort", "descending");
  });

  it("folds the groups of a row away and keeps its subtotal", async () => {
    const { user } = renderApp(`/ask?release=${releaseId}&outcome=smoking:1&down=settlement,sex`);
    const table = within(await grid());
    expect(table.getAllByRole("row")).toHaveLength(1 + 3 * 3 + 1);
    await user.click(table.getByRole("button", { name: "Town, its groups" }));
    expect(table.getAllByRole("row")).toHaveLength(1 + 1 + 2 * 3 + 1);
    expect(table.getByRole("button", { name: "Town, its groups" })).toHaveAttribute("aria-expanded", "false");
  });

  it("names what the address says that can't be read, and answers the rest", async () => {
    renderApp(`${ASKED}&level=42`);
    expect(await screen.findByText("Part of this address couldn't be read.")).toBeInTheDocument();
    expect(await grid()).toBeInTheDocument();
  });
});

describe("a question being put", () => {
  it("starts at the release published last, with examples; one press asks", async () => {
    const { requests } = serveApi(api());
    const { user, address } = renderApp("/ask");
    expect(await sentence()).toContain(
      "In Tamarisk Coast Adult Health Survey, 2025, of every 100 people, how many have choose an outcome?",
    );
    await user.click(await screen.findByRole("button", { name: /^Smoking now: Daily, by/u }));
    await grid();
    expect(address()).toContain("outcome=smoking:1");
    expect(requests.filter(({ path }) => path === "/api/tables")).toHaveLength(1);
  });

  it("takes an outcome by keyboard alone: typed, chosen, ticked", async () => {
    serveApi(api());
    const { user, address } = renderApp("/ask");
    (await screen.findByRole("button", { name: "choose an outcome" })).focus();
    await user.keyboard("{Enter}");
    const dialog = within(await screen.findByRole("dialog", { name: "Who counts as affected?" }));
    expect(dialog.queryByText("Weight: design and non-response")).not.toBeInTheDocument();
    await user.keyboard("smok{ArrowDown}{Enter}");
    await user.click(await dialog.findByRole("checkbox", { name: "Less than daily" }));
    expect(dialog.queryByRole("checkbox", { name: "Refused" })).not.toBeInTheDocument();
    await user.click(dialog.getByRole("button", { name: "Count these" }));
    await waitFor(() => expect(address()).toBe(`/ask?release=${releaseId}&outcome=smoking:2`));
    expect(await sentence()).toContain("how many have Smoking now: Less than daily?");
  });

  it("splits by bands, compares, and goes back by the browser's back", async () => {
    serveApi(api());
    const { user, address, router } = renderApp(`/ask?release=${releaseId}&outcome=smoking:1`);
    const [down] = await screen.findAllByRole("button", { name: "nothing" });
    if (down) await user.click(down);
    await user.click(await screen.findByRole("option", { name: /Age in years/u }));
    await user.click(await screen.findByRole("button", { name: "Three ages" }));
    await user.click(screen.getByRole("button", { name: "Split by these bands" }));
    await waitFor(() => expect(address()).toContain("down=age(18..44;45..64;65..)"));
    const slots = await screen.findAllByRole("button", { name: "nothing" });
    const last = slots.at(-1);
    if (last) await user.click(last);
    await user.click(await screen.findByRole("radio", { name: /The rest/u }));
    await user.click(screen.getByRole("button", { name: "Compare" }));
    await waitFor(() => expect(address()).toContain("than=rest"));
    await router.navigate(-1);
    await waitFor(() => expect(address()).not.toContain("than="));
    await waitFor(async () => expect(await sentence()).toMatch(/Compared with nothing\.$/u));
  });

  it("asks only about some people", async () => {
    serveApi(api());
    const { user, address } = renderApp(`/ask?release=${releaseId}&outcome=smoking:1`);
    await user.click(await screen.findByRole("button", { name: "people" }));
    await user.click(await screen.findByRole("option", { name: /Age in years/u }));
    await user.type(await screen.findByRole("textbox", { name: "From" }), "18");
    await user.click(screen.getByRole("button", { name: "Ask about these" }));
    await waitFor(() => expect(address()).toContain("among=age:18.."));
    expect(await sentence()).toContain("of every 100 people with Age in years: at least 18, how many");
  });

  it("keeps the last answer in view while the next is worked out", async () => {
    const { table } = serveApi(api());
    const { user } = renderApp(ASKED);
    await grid();
    let answer: (() => void) | undefined;
    table["POST /api/tables"] = async ({ body }) => {
      await new Promise<void>((resolve) => {
        answer = resolve;
      });
      return { body: tableOf(Question.parse(body)) };
    };
    await user.click(screen.getByRole("button", { name: "95 % intervals" }));
    await user.click(await screen.findByRole("radio", { name: /90 %/u }));
    await waitFor(() => expect(screen.getByText("Working out the answer…")).toBeInTheDocument());
    expect(document.querySelector("[aria-busy=true] [role=grid]")).not.toBeNull();
    answer?.();
    await waitFor(() => expect(document.querySelector("[aria-busy=true]")).toBeNull());
  });
});

describe("taking figures away", () => {
  it("copies the table as text once the ledger knows", async () => {
    const { requests } = serveApi(api());
    const { user } = renderApp(ASKED);
    await grid();
    await user.click(screen.getByRole("button", { name: "Copy" }));
    await screen.findByText("Copied");
    expect(await navigator.clipboard.readText()).toContain("18–24\t36.9\t32.7\t41.9\t16\t249");
    expect(requests.find(({ path }) => path === "/api/tables/downloads")?.body).toMatchObject({ format: "text" });
  });

  it("takes nothing when the ledger can't be written", async () => {
    serveApi(api({ "POST /api/tables/downloads": () => refuse(503, "The ledger is busy. Try again in a minute.") }));
    const save = vi.fn();
    URL.createObjectURL = save;
    const { user } = renderApp(ASKED);
    await grid();
    await user.click(screen.getByRole("button", { name: "Download CSV" }));
    expect(await screen.findByRole("alert")).toHaveTextContent(
      "Nothing was taken away: The ledger is busy. Try again in a minute.",
    );
    expect(save).not.toHaveBeenCalled();
  });
});

describe("plots", () => {
  it("name every group with its figures, and show the same as a table", async () => {
    serveApi(api());
    const { user } = renderApp(`${ASKED}&view=differences`);
    const plot = await screen.findByRole("listbox", {
      name: /^Difference from everyone in Smoking now: Daily, percentage points/u,
    });
    expect(within(plot).getByRole("option", { name: "45–54, Men (with caution): ▼ −13.9 (−17.8 to −10.0)" })).toBeInTheDocument();
    await user.click(screen.getByRole("button", { name: "As a table" }));
    const table = within(screen.getByRole("table"));
    expect(table.getByRole("row", { name: /^45–54, Men ▼ −13\.9 \(−17\.8 to −10\.0\) \d+ caution$/u })).toBeInTheDocument();
    expect(table.getByRole("row", { name: /^65 and over, Men withheld: too few respondents/u })).toBeInTheDocument();
  });
});

describe("when there is no answer", () => {
  it("says what the server refused and offers another try", async () => {
    const { table } = serveApi(
      api({ "POST /api/tables": () => refuse(400, "This release has no variable “smoking”. Choose another outcome.") }),
    );
    const { user } = renderApp(ASKED);
    expect(await screen.findByRole("alert")).toHaveTextContent("This release has no variable “smoking”. Choose another outcome.");
    Object.assign(table, api());
    await user.click(screen.getByRole("button", { name: "Try again" }));
    expect(await grid()).toBeInTheDocument();
  });

  it("keeps the sentence where the release is closed to the reader, so that another can be chosen", async () => {
    serveApi(
      api({
        "GET /api/releases/:id/codebook": ({ params }) =>
          params.id === releaseId ? { body: codebook } : refuse(404, "There is no such release, or it isn't open to you."),
      }),
    );
    const { user, address } = renderApp(ASKED.replace(releaseId, olderReleaseId));
    expect(await screen.findByRole("alert")).toHaveTextContent("There is no such release, or it isn't open to you.");
    await user.click(screen.getByRole("button", { name: /Survey, 2023$/u }));
    await user.click(await screen.findByRole("option", { name: /2025/u }));
    expect(await grid()).toBeInTheDocument();
    expect(address()).toContain(`release=${releaseId}&outcome=smoking:1`);
  });

  it("teaches where no survey is open, and where none is published", async () => {
    serveApi(api({ "GET /api/surveys": { surveys: [] } }));
    const { unmount } = renderApp("/ask");
    expect(await screen.findByText("No survey is open to you yet.")).toBeInTheDocument();
    unmount();
    const [survey] = surveys.surveys;
    serveApi(api({ "GET /api/surveys": { surveys: [{ ...survey, releases: [] }] } }));
    const { queryClient } = await import("../../../src/lib/queryClient.ts");
    queryClient.clear();
    renderApp("/ask");
    expect(await screen.findByText("No release is published yet.")).toBeInTheDocument();
  });
});
