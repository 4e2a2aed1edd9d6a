import { readFile } from "node:fs/promises";
import { expect, it } from "vitest";
import { z } from "zod";

const Package = z.object({ scripts: z.record(z.string(), z.string()) });

// npm sends its signals to the shell it starts, which would die and leave the command behind: `exec` puts the command in its place.
it("runs every command in the shell's place, so that a signal to npm stops what it started", async () => {
  const text = await readFile(new URL("../../package.json", import.meta.url), "utf8");
  const { scripts } = Package.parse(JSON.parse(text));
  for (const [name, script] of Object.entries(scripts)) expect(script).toBe(`exec node server/cli/prepare.mjs ${name}`);
});
