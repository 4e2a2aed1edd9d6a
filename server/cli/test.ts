import { startVitest } from "vitest/node";
import { buildClient } from "./buildClient.ts";

/** Every test, or those whose path holds one of the arguments; the last line printed is `N passed, N failed`. */
const filters = process.argv.slice(2);
await buildClient();
const vitest = await startVitest("test", filters, { watch: false, run: true });
const tests = vitest.state.getTestModules().flatMap((module) => [...module.children.allTests()]);
const passed = tests.filter((test) => test.result().state === "passed").length;
// Whatever did not pass counts as failed: skipped tests and files that could not be loaded too.
const unloaded = vitest.state.getTestModules().filter((module) => module.errors().length > 0).length;
const unhandled = vitest.state.getUnhandledErrors().length;
const failed = tests.length - passed + unloaded + unhandled;
await vitest.close();
console.log(`${passed} passed, ${failed} failed`);
process.exit(failed > 0 || passed === 0 ? 1 : 0);
