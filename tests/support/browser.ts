import { chromium, type Browser, type Page } from "playwright-core";

const FLAGS = [
  "--no-sandbox",
  "--disable-gpu",
  "--disable-quic",
  "--no-first-run",
  "--disable-background-networking",
  "--disable-component-update",
  "--disable-sync",
];

/** Debian's Chromium, headless. */
export function startBrowser(): Promise<Browser> {
  return chromium.launch({ executablePath: "/usr/bin/chromium", args: FLAGS });
}

/** A new window of somebody not signed in; whatever the pages throw fails the test through `faults`. */
export async function openWindow(
  browser: Browser,
  address: string,
  options: { width?: number; colorScheme?: "light" | "dark" } = {},
): Promise<{ page: Page; faults: string[] }> {
  const context = await browser.newContext({
    baseURL: address,
    viewport: { width: options.width ?? 1280, height: 900 },
    colorScheme: options.colorScheme ?? "light",
    reducedMotion: "reduce",
    acceptDownloads: true,
  });
  const page = await context.newPage();
  const faults: string[] = [];
  page.on("pageerror", (error) => faults.push(error.message));
  page.setDefaultTimeout(15_000);
  return { page, faults };
}

/** Signs in as a person would. */
export async function signIn(page: Page, email: string, password: string): Promise<void> {
  await page.goto("/sign-in");
  await page.getByLabel("E-mail").fill(email);
  await page.getByLabel("Password").fill(password);
  await page.getByRole("button", { name: "Sign in" }).click();
  await page.waitForURL((url) => url.pathname !== "/sign-in");
}
