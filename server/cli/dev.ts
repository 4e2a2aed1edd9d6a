import { spawn } from "node:child_process";
import { createServer } from "vite";
import { seedDemo } from "../../seeds/demo.ts";
import { readConfig } from "../config.ts";
import { startServer } from "../main.ts";
import { createLogger } from "../middleware/requestLog.ts";
import { openDatabase } from "./openDatabase.ts";
import { closeOnSignal, runCommand } from "./runCommand.ts";

/** The pages with Vite's reload on `PORT`, the API behind its proxy on the port after it, started anew on every change. */
await runCommand(async () => {
  const config = readConfig({ NODE_ENV: "development", LOG_LEVEL: "info", ...process.env });
  const apiPort = config.port + 1;
  const database = await openDatabase(config);
  const seeding = await startServer({ config: { ...config, port: 0 }, database, logger: createLogger("warn") });
  if (config.isDemo) await seedDemo(seeding.services);
  await seeding.close();
  const api = spawn(
    "npx",
    ["tsx", "watch", "--clear-screen=false", "--include", "server/**/*.ts", "--include", "shared/**/*.ts", "server/cli/api.ts"],
    {
      stdio: "inherit",
      env: {
        ...process.env,
        NODE_ENV: "development",
        DATABASE_URL: database.url,
        PORT: String(apiPort),
        PUBLIC_URL: config.publicUrl,
      },
    },
  );
  process.env.API_PORT = String(apiPort);
  const pages = await createServer({ server: { port: config.port, strictPort: true } });
  await pages.listen();
  pages.printUrls();
  closeOnSignal(async () => {
    await pages.close();
    api.kill("SIGTERM");
    await database.close();
  });
});
