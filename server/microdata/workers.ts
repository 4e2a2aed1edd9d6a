/** Options of a Piscina pool whose work is a TypeScript module of ours, wherever the process was started from. */
export function workerOptions(module: URL): { filename: string; execArgv: string[] } {
  return { filename: module.href, execArgv: ["--import", import.meta.resolve("tsx")] };
}
