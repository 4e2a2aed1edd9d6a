import "@testing-library/jest-dom/vitest";
import { cleanup, configure } from "@testing-library/react";
import { afterEach, vi } from "vitest";
import { queryClient } from "../../src/lib/queryClient.ts";

// The first page of a file is fetched and compiled while the test waits.
configure({ asyncUtilTimeout: 5_000 });

// jsdom lays nothing out, so a virtual list would measure 0 and show no row.
for (const side of ["clientHeight", "clientWidth"])
  Object.defineProperty(Element.prototype, side, { configurable: true, get: () => 400 });
for (const side of ["offsetHeight", "offsetWidth"])
  Object.defineProperty(HTMLElement.prototype, side, { configurable: true, get: () => 400 });
Element.prototype.scrollIntoView = () => undefined;
window.scrollTo = () => undefined;

queryClient.setDefaultOptions({ queries: { ...queryClient.getDefaultOptions().queries, retry: false } });

afterEach(() => {
  cleanup();
  queryClient.clear();
  localStorage.clear();
  delete document.documentElement.dataset.theme;
  vi.unstubAllGlobals();
  vi.restoreAllMocks();
});
