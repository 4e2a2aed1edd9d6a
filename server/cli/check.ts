import { spawnSync } from "node:child_process";

/** Types, lint without warnings, format, unused code. All run, so that one sitting mends everything. */
const CHECKS: [name: string, command: string[]][] = [
  ["types", ["tsc", "--noEmit", "-p", "."]],
  ["lint", ["eslint", "--max-warnings", "0", "."]],
  ["format", ["prettier", "--check", "--log-level", "warn", "."]],
  ["unused code", ["knip"]],
];

const failures = CHECKS.filter(([name, command]) => {
  console.log(`— ${name}`);
  return spawnSync("npx", ["--no-install", ...command], { stdio: "inherit" }).status !== 0;
});
console.log(failures.length === 0 ? "All checks passed." : `Failed: ${failures.map(([name]) => name).join(", ")}.`);
process.exit(failures.length === 0 ? 0 : 1);
