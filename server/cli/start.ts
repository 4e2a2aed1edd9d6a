import { createServer } from "node:net";
import { startServer } from "../main.ts";
import { createLogger } from "../middleware/requestLog.ts";
import { readConfig, type Config } from "../config.ts";
import { DEMO_ACCOUNTS, DEMO_PASSWORD } from "../../seeds/accounts.ts";
import { buildClient } from "./buildClient.ts";
import { CommandFault } from "./fault.ts";
import { firstAdministrator } from "./firstAdministrator.ts";
import { openDatabase } from "./openDatabase.ts";
import { closeOnSignal, runCommand } from "./runCommand.ts";
import { seedDemo } from "../../seeds/demo.ts";

/** Fails early, before anything is started, when the port is taken. */
async function checkPort({ host, port }: Config): Promise<void> {
  await new Promise<void>((resolve, reject) => {
    const probe = createServer();
    probe.once("error", (error: NodeJS.ErrnoException) => {
      const reason =
        error.code === "EADDRINUSE" ? "is in use by another program" : `can't be opened (${error.code ?? error.message})`;
      reject(
        new CommandFault(
          "portInUse",
          `Port ${port} on ${host} ${reason}. Nothing was started. Choose another, for example: PORT=${port + 1} npm start`,
        ),
      );
    });
    probe.listen(port, host, () => probe.close(() => resolve()));
  });
}

function settings(): Config {
  try {
    return readConfig({ NODE_ENV: "production", LOG_LEVEL: "warn", ...process.env });
  } catch (error) {
    throw new CommandFault("settings", error instanceof Error ? error.message : String(error));
  }
}

await runCommand(async () => {
  const config = settings();
  await checkPort(config);
  const logger = createLogger(config.logLevel);
  console.log("Starting the database …");
  const database = await openDatabase(config);
  const closers = [database.close];
  let isClosed = false;
  const close = async () => {
    if (isClosed) return;
    isClosed = true;
    console.log("Stopping …");
    for (const closer of closers.reverse()) await closer();
  };
  closeOnSignal(close);
  try {
    console.log("Building the pages …");
    await buildClient();
    const server = await startServer({ config, database, logger });
    closers.push(server.close);
    if (config.isDemo) {
      console.log("Loading the demo (only the first time takes long) …");
      await seedDemo(server.services);
    }
    console.log(`\nPerhundred is at ${config.publicUrl}\n`);
    if (config.isDemo) {
      console.log(`Demo sign-ins, all with the password “${DEMO_PASSWORD}”:`);
      for (const { email, label } of DEMO_ACCOUNTS) console.log(`  ${email.padEnd(38)} ${label}`);
    } else {
      const link = await firstAdministrator(server.services);
      if (link) console.log(`No administrator yet. Open this one-time link to become the first:\n  ${link}`);
    }
    console.log("\nCtrl-C stops it, and the database with it.");
  } catch (error) {
    await close();
    throw error;
  }
});
