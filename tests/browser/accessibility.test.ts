import { AxeBuilder } from "@axe-core/playwright";
import type { Browser } from "playwright-core";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { DEMO_PASSWORD } from "../../seeds/accounts.ts";
import { seedDemo } from "../../seeds/demo.ts";
import { Release } from "../../server/models/Release.ts";
import { openWindow, signIn, startBrowser } from "../support/browser.ts";
import { startTestApp, type TestApp } from "../support/testApp.ts";

let app: TestApp;
let browser: Browser;
const ids = { survey: "", published: "", draft: "" };

beforeAll(async () => {
  app = await startTestApp();
  await seedDemo(app.services);
  const [published, draft] = [
    await Release.findOne({ where: { wave: "2025" } }),
    await Release.findOne({ where: { wave: "2026 pilot" } }),
  ];
  Object.assign(ids, { survey: published?.surveyId, published: published?.id, draft: draft?.id });
  browser = await startBrowser();
});
afterAll(async () => {
  await browser.close();
  await app.close();
});

/** Every page of the product, by who sees most on it; `heading` says when it is there. */
const PAGES: { who: string | null; address: () => string }[] = [
  { who: null, address: () => "/sign-in" },
  { who: null, address: () => "/welcome/used-long-ago" },
  { who: "steward", address: () => "/" },
  { who: "steward", address: () => "/holdings" },
  { who: "steward", address: () => `/surveys/${ids.survey}` },
  { who: "steward", address: () => `/surveys/${ids.survey}/access` },
  { who: "steward", address: () => `/releases/${ids.draft}` },
  { who: "steward", address: () => `/releases/${ids.draft}/codebook` },
  { who: "steward", address: () => `/releases/${ids.draft}/design` },
  { who: "steward", address: () => `/releases/${ids.published}/design` },
  { who: "steward", address: () => `/releases/${ids.published}/readiness` },
  { who: "steward", address: () => "/ledger" },
  { who: "epidemiologist", address: () => "/ask" },
  {
    who: "epidemiologist",
    address: () => `/ask?release=${ids.published}&outcome=smoking:1&down=settlement,education&across=sex&than=rest`,
  },
  { who: "epidemiologist", address: () => `/ask?release=${ids.published}&mean=distress&down=age(18..44;45..)&view=intervals` },
  { who: "planner", address: () => "/" },
  { who: "second.epidemiologist", address: () => "/" },
  { who: "second.epidemiologist", address: () => "/ask" },
  { who: "administrator", address: () => "/people" },
  { who: "administrator", address: () => "/" },
  { who: "planner", address: () => "/account" },
  { who: "planner", address: () => "/help" },
  { who: "planner", address: () => "/no-such-page" },
];

describe.each([
  { width: 1280, colorScheme: "light" },
  { width: 390, colorScheme: "dark" },
] as const)("axe finds no violation at $width px, $colorScheme", ({ width, colorScheme }) => {
  it("on any page, and none scrolls sideways", async () => {
    const violations: string[] = [];
    let opened: Awaited<ReturnType<typeof openWindow>> | null = null;
    let signedIn: string | null | undefined;
    for (const { who, address } of PAGES) {
      if (opened === null || who !== signedIn) {
        await opened?.page.context().close();
        opened = await openWindow(browser, app.address, { width, colorScheme });
        if (who !== null) await signIn(opened.page, `${who}@perhundred.example`, DEMO_PASSWORD);
        signedIn = who;
      }
      const { page, faults } = opened;
      await page.goto(address());
      await page.getByRole("heading", { level: 1 }).waitFor();
      await page
        .getByText(/^Fetching /)
        .first()
        .waitFor({ state: "detached" });
      const { violations: found } = await new AxeBuilder({ page }).analyze();
      for (const { id, nodes } of found)
        violations.push(`${address()}: ${id}: ${nodes[0]?.html.slice(0, 200) ?? ""} ${nodes[0]?.failureSummary ?? ""}`);
      const excess = await page.evaluate(() => document.documentElement.scrollWidth - window.innerWidth);
      if (excess > 0) violations.push(`${address()}: ${excess} px wider than the window`);
      for (const fault of faults.splice(0)) violations.push(`${address()}: ${fault}`);
    }
    await opened?.page.context().close();
    expect(violations).toEqual([]);
  }, 300_000);
});
