// Makes a machine ready and then runs one of our commands in this same process (so that signals reach it directly).
// Plain JavaScript, because it runs before anything is installed: `node server/cli/prepare.mjs <command> [arguments]`.
import { execFileSync, spawnSync } from "node:child_process";
import { createHash } from "node:crypto";
import { existsSync, readFileSync, writeFileSync } from "node:fs";
import path from "node:path";
import { fileURLToPath, pathToFileURL } from "node:url";

const ROOT = fileURLToPath(new URL("../../", import.meta.url));
const MISSING_PROGRAM = 4;
const NODE_MINIMUM = [20, 19];

/** Debian package and the program by which it is known to be there. */
const DATABASE = { package: "mariadb-server", programs: ["mariadbd", "mariadb-install-db", "mariadb"] };
const BROWSER = { package: "chromium", programs: ["chromium"] };

/** What each command needs beside the dependencies. */
const COMMANDS = {
  start: { file: "start.ts", needs: process.env.DATABASE_URL ? [] : [DATABASE] },
  dev: { file: "dev.ts", needs: process.env.DATABASE_URL ? [] : [DATABASE] },
  test: { file: "test.ts", needs: [DATABASE, BROWSER] },
  bench: { file: "bench.ts", needs: [DATABASE] },
  reference: { file: "reference.ts", needs: [] },
  check: { file: "check.ts", needs: [] },
};

function stop(message, exitCode) {
  console.error(message);
  process.exit(exitCode);
}

function checkNode() {
  const [major, minor] = process.versions.node.split(".").map(Number);
  if (major < NODE_MINIMUM[0] || (major === NODE_MINIMUM[0] && minor < NODE_MINIMUM[1])) {
    stop(`Node.js ${NODE_MINIMUM.join(".")} or newer is needed; this is ${process.versions.node}.`, MISSING_PROGRAM);
  }
}

/** Installs the dependencies from the lockfile unless the ones here are of this very lockfile. */
function installDependencies() {
  const stamp = path.join(ROOT, "node_modules/.installed-lockfile");
  const lockfile = createHash("sha256")
    .update(readFileSync(path.join(ROOT, "package-lock.json")))
    .digest("hex");
  if (existsSync(stamp) && readFileSync(stamp, "utf8") === lockfile) return;
  console.error("Installing dependencies …");
  const result = spawnSync("npm", ["ci", "--include=dev", "--no-audit", "--no-fund"], {
    cwd: ROOT,
    stdio: ["ignore", 2, "inherit"],
  });
  if (result.status !== 0) stop("npm ci failed; see above. Nothing was started.", result.status ?? 1);
  writeFileSync(stamp, lockfile);
}

function isInstalled(program) {
  return process.env.PATH.split(path.delimiter).some((folder) => existsSync(path.join(folder, program)));
}

function installPackages(packages) {
  const command = `apt-get update && apt-get install -y --no-install-recommends ${packages.join(" ")}`;
  const isRoot = process.getuid?.() === 0;
  const hasSudo = !isRoot && spawnSync("sudo", ["-n", "true"], { stdio: "ignore" }).status === 0;
  const byHand = `${packages.join(" and ")} missing. Install with:\n  ${isRoot ? "" : "sudo "}sh -c '${command}'`;
  if (!isInstalled("apt-get") || (!isRoot && !hasSudo)) stop(byHand, MISSING_PROGRAM);
  console.error(`Installing ${packages.join(" and ")} …`);
  const run = ["sh", "-c", `DEBIAN_FRONTEND=noninteractive; export DEBIAN_FRONTEND; ${command}`];
  const [program, ...rest] = isRoot ? run : ["sudo", "-n", ...run];
  try {
    execFileSync(program, rest, { stdio: ["ignore", "ignore", "inherit"] });
  } catch {
    stop(`That didn't work. ${byHand}`, MISSING_PROGRAM);
  }
}

const [name = "", ...rest] = process.argv.slice(2);
const command = COMMANDS[name];
if (!command) stop(`Usage: node server/cli/prepare.mjs ${Object.keys(COMMANDS).join(" | ")}`, 2);
checkNode();
// Servers live in the system folders, which an ordinary user's path may lack.
process.env.PATH = `${process.env.PATH ?? ""}${path.delimiter}/usr/sbin${path.delimiter}/sbin`;
process.chdir(ROOT);
installDependencies();
const missing = command.needs.filter(({ programs }) => !programs.every(isInstalled)).map((need) => need.package);
if (missing.length > 0) installPackages(missing);
process.argv = [process.argv[0], path.join(ROOT, "server/cli", command.file), ...rest];
const { register } = await import("tsx/esm/api");
register();
await import(pathToFileURL(process.argv[1]).href);
