import path from "node:path";
import { z } from "zod";

const Environment = z.object({
  NODE_ENV: z.enum(["development", "test", "production"]).default("production"),
  PORT: z.coerce.number().int().min(0).max(65535).default(4180),
  HOST: z.string().default("127.0.0.1"),
  PUBLIC_URL: z.url().optional(),
  PERHUNDRED_DATA: z.string().default(".data"),
  PERHUNDRED_DEMO: z.enum(["0", "1"]).default("1"),
  DATABASE_URL: z.string().optional(),
  SESSION_SECRET: z.string().min(32).optional(),
  COLUMN_CACHE_MB: z.coerce.number().int().min(16).default(1024),
  WORKERS: z.coerce.number().int().min(1).max(64).default(2),
  FLOOR_RESPONDENTS: z.coerce.number().int().min(0).default(5),
  FLOOR_AFFECTED: z.coerce.number().int().min(0).default(0),
  FLOOR_UNAFFECTED: z.coerce.number().int().min(0).default(0),
  LOG_LEVEL: z.enum(["fatal", "error", "warn", "info", "debug", "silent"]).default("info"),
});

/** Settings of one process, read from the environment once; nothing else reads `process.env`. */
export interface Config {
  environment: "development" | "test" | "production";
  port: number;
  host: string;
  /** Where readers reach the product; links in mails and one-time links start with it. No slash at the end. */
  publicUrl: string;
  /** Folder that holds everything this installation keeps outside MariaDB, and the private MariaDB. */
  dataFolder: string;
  isDemo: boolean;
  databaseUrl: string | null;
  sessionSecret: string | null;
  columnCacheBytes: number;
  workers: number;
  /** No release may set its disclosure minimums lower. */
  floor: { respondents: number; affected: number; unaffected: number };
  logLevel: string;
}

/** @throws {Error} naming each variable that can't be read. */
export function readConfig(environment: NodeJS.ProcessEnv): Config {
  const result = Environment.safeParse(environment);
  if (!result.success) {
    const lines = result.error.issues.map((issue) => `${issue.path.join(".")}: ${issue.message}`);
    throw new Error(`These settings can't be used:\n${lines.join("\n")}`);
  }
  const values = result.data;
  return {
    environment: values.NODE_ENV,
    port: values.PORT,
    host: values.HOST,
    publicUrl: (values.PUBLIC_URL ?? `http://${values.HOST}:${values.PORT}`).replace(/\/$/, ""),
    dataFolder: path.resolve(values.PERHUNDRED_DATA),
    isDemo: values.PERHUNDRED_DEMO === "1",
    databaseUrl: values.DATABASE_URL ?? null,
    sessionSecret: values.SESSION_SECRET ?? null,
    columnCacheBytes: values.COLUMN_CACHE_MB * 2 ** 20,
    workers: values.WORKERS,
    floor: { respondents: values.FLOOR_RESPONDENTS, affected: values.FLOOR_AFFECTED, unaffected: values.FLOOR_UNAFFECTED },
    logLevel: values.LOG_LEVEL,
  };
}
