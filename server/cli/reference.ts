import path from "node:path";
import { fileURLToPath } from "node:url";
import { runReference } from "./reference/run.ts";

/** `npm run reference -- [DIR]`: the cases of a folder against the product's own import, columns and engine. */
const folder = path.resolve(process.argv[2] ?? fileURLToPath(new URL("../../tests/reference", import.meta.url)));
const { passed, failed, notYet } = await runReference(folder, (line) => console.log(line));
console.log(`${passed} passed, ${failed} failed, ${notYet} not yet`);
process.exit(failed === 0 ? 0 : 1);
