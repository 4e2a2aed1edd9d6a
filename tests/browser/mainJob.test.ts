import { readFile } from "node:fs/promises";
import { fileURLToPath } from "node:url";
import Papa from "papaparse";
import type { Browser } from "playwright-core";
import { afterAll, beforeAll, expect, it } from "vitest";
import { createPerson } from "../factories/people.ts";
import { openWindow, signIn, startBrowser } from "../support/browser.ts";
import { TEST_PASSWORD } from "../support/client.ts";
import { NHANES_CODEBOOK } from "../support/nhanes.ts";
import { startTestApp, type TestApp } from "../support/testApp.ts";

let app: TestApp;
let browser: Browser;

beforeAll(async () => {
  app = await startTestApp();
  browser = await startBrowser();
});
afterAll(async () => {
  await browser.close();
  await app.close();
});

it("goes from a steward's files to an epidemiologist's comparison and a planner's view", async () => {
  const steward = await createPerson(["steward"], { name: "Mara Tellin" });
  const epidemiologist = await createPerson(["epidemiologist"], { name: "Odo Varga" });
  const planner = await createPerson(["planner"], { name: "Sunniva Roe" });

  // The steward creates a survey and brings the release in.
  const { page, faults } = await openWindow(browser, app.address);
  await signIn(page, steward.email, TEST_PASSWORD);
  await page.getByRole("link", { name: "Holdings" }).first().click();
  await page.getByRole("button", { name: "New survey" }).click();
  await page.getByLabel("Title").fill("Examination survey");
  await page.getByRole("button", { name: "Create the survey" }).click();
  await page.getByRole("link", { name: "Examination survey" }).click();
  await page.getByLabel("Wave").fill("2009–2010");
  const choose = async (label: string, file: Parameters<Awaited<ReturnType<typeof waitForChooser>>["setFiles"]>[0]) => {
    const chooser = waitForChooser();
    await page.getByRole("button", { name: `Choose a file: ${label}` }).click();
    await (await chooser).setFiles(file);
  };
  const waitForChooser = () => page.waitForEvent("filechooser");
  await choose("Microdata (CSV)", fileURLToPath(new URL("../reference/nhanes.csv", import.meta.url)));
  await choose("Codebook (CSV), if there is one", {
    name: "codebook.csv",
    mimeType: "text/csv",
    buffer: Buffer.from(NHANES_CODEBOOK),
  });
  await page.getByRole("button", { name: "Bring in the release" }).click();
  await page.getByText("2009–2010 was brought in").waitFor();
  await page.getByRole("link", { name: "Open the release" }).click();

  // Declares the design, looks at the readiness, publishes.
  await page.getByRole("link", { name: "Design", exact: true }).first().click();
  for (const [field, variable] of [
    ["Weight", "WTMEC2YR"],
    ["Stratum", "SDMVSTRA"],
    ["PSU", "SDMVPSU"],
  ] as const) {
    await page.getByRole("combobox", { name: field, exact: true }).fill(variable);
    await page.getByRole("option", { name: variable }).click();
  }
  await page.getByRole("button", { name: "Declare the design" }).click();
  await page.getByRole("link", { name: "Look at the readiness" }).click();
  await page.getByText("Nothing stands in the way of publication.").waitFor();
  expect(await page.getByText("Degrees of freedom").locator("..").innerText()).toContain("16");
  await page.getByRole("button", { name: "Publish" }).click();
  await page.getByRole("alertdialog").getByRole("button", { name: "Publish" }).click();
  await page.getByText("Published", { exact: true }).first().waitFor();

  // Gives access.
  await page.getByRole("link", { name: "Examination survey" }).click();
  await page.getByRole("link", { name: "Access" }).click();
  for (const person of [epidemiologist, planner]) {
    await page.getByRole("combobox", { name: "Person" }).fill(person.name);
    await page.getByRole("option", { name: person.name }).click();
    await page.getByLabel("For what").fill("Report on cholesterol");
    await page.getByRole("button", { name: "Give access" }).click();
    await page.getByText(`${person.name} may ask of this survey`).waitFor();
  }

  // The epidemiologist puts the question together in the line, and compares.
  const other = await openWindow(browser, app.address);
  await signIn(other.page, epidemiologist.email, TEST_PASSWORD);
  await other.page.getByRole("link", { name: "Ask", exact: true }).first().click();
  const slot = (value: string) => other.page.getByRole("heading", { level: 1 }).getByRole("button", { name: value });
  const pick = async (variable: string) => other.page.getByRole("dialog").getByRole("option", { name: variable }).click();
  await slot("choose an outcome").click();
  await pick("Total cholesterol");
  await other.page.getByRole("dialog").getByText("Yes", { exact: true }).click();
  await other.page.getByRole("button", { name: "Count these" }).click();
  await other.page.getByRole("grid").waitFor();
  await slot("nothing").first().click();
  await pick("Race and ethnicity");
  await other.page.keyboard.press("Escape");
  await other.page.getByRole("rowheader", { name: "Non-Hispanic black" }).waitFor();
  expect(other.page.url()).toContain("down=race");
  // Crude prevalence of all ages in the file, 11.2 %: R's survey package (see the API test for its digits).
  expect(await other.page.getByRole("main").innerText()).toContain("11.2");
  const address = new URL(other.page.url());
  await other.page.goto(`${address.pathname}${address.search}&across=RIAGENDR&than=rest`);
  await other.page.getByRole("columnheader", { name: "Women" }).waitFor();
  expect(await other.page.getByRole("main").innerText()).toMatch(/[▲▼○]/);

  // Takes the table away; the ledger knows.
  const download = other.page.waitForEvent("download");
  await other.page.getByRole("button", { name: "Download CSV" }).click();
  const csv = await readFile(await (await download).path(), "utf8");
  expect(csv).toContain("how many have Total cholesterol of 240 mg/dL or more: Yes?");
  const { data } = Papa.parse<string[]>(csv.replace(/^\uFEFF/, ""));
  expect(data.some((row) => row.some((cell) => /^0\.1121\d{6,}/.test(cell)))).toBe(true);
  await page.goto("/ledger");
  await page.getByText("Took away as csv").first().waitFor();

  // The planner isn't shown what can't be relied on; after the grant is taken back, nothing at all.
  const third = await openWindow(browser, app.address);
  await signIn(third.page, planner.email, TEST_PASSWORD);
  const asked = new URL(other.page.url());
  await third.page.goto(`${asked.pathname}${asked.search}&among=agecat:2,3,4`);
  await third.page.getByRole("columnheader", { name: "Women" }).waitFor();
  expect(await third.page.getByRole("main").innerText()).toMatch(/withheld|not shown/i);
  await page.goto(new URL(page.url()).origin);
  await page.goto("/holdings");
  await page.getByRole("link", { name: "Examination survey" }).click();
  await page.getByRole("link", { name: "Access" }).click();
  await page.getByRole("button", { name: "Take back from Sunniva Roe" }).click();
  await page.getByRole("alertdialog").getByRole("button", { name: "Take back" }).click();
  await page.getByText("Taken back on").waitFor();
  await third.page.reload();
  await expect.poll(async () => third.page.getByRole("main").innerText()).not.toMatch(/Women/);
  expect([...faults, ...other.faults, ...third.faults]).toEqual([]);
});
