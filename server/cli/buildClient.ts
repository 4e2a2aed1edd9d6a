import { createHash } from "node:crypto";
import { existsSync } from "node:fs";
import { readFile, readdir, writeFile } from "node:fs/promises";
import path from "node:path";
import { fileURLToPath } from "node:url";

const ROOT = fileURLToPath(new URL("../../", import.meta.url));
const STAMP = path.join(ROOT, "dist/client/.built-from");

/** SHA-256 over everything that the client is built from. */
async function fingerprint(): Promise<string> {
  const hash = createHash("sha256");
  for (const folder of ["src", "shared"]) {
    const entries = await readdir(path.join(ROOT, folder), { recursive: true, withFileTypes: true });
    const files = entries.filter((entry) => entry.isFile()).map((entry) => path.join(entry.parentPath, entry.name));
    for (const file of files.sort()) hash.update(path.relative(ROOT, file)).update(await readFile(file));
  }
  for (const file of ["index.html", "vite.config.ts", "package-lock.json"]) hash.update(await readFile(path.join(ROOT, file)));
  return hash.digest("hex");
}

/** Builds the pages into dist/client, unless what is there was built from the same sources. */
export async function buildClient(): Promise<void> {
  const source = await fingerprint();
  if (existsSync(STAMP) && (await readFile(STAMP, "utf8")) === source) return;
  const { build } = await import("vite");
  // The bundler sets the mode for the whole process, where tests or a server go on afterwards.
  const mode = process.env.NODE_ENV;
  try {
    await build({ root: ROOT, logLevel: "warn", mode: "production" });
  } finally {
    if (mode === undefined) delete process.env.NODE_ENV;
    else process.env.NODE_ENV = mode;
  }
  await writeFile(STAMP, source);
}
