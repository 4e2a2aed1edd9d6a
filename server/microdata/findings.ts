import type { ReadinessFinding } from "../../shared/contracts/readiness.ts";

/** A finding that blocks publication, with how to mend it. */
export const fault = (kind: string, message: string, remedy: string, count: number | null): ReadinessFinding => ({
  kind,
  severity: "fault",
  message,
  remedy,
  count,
});
/** A finding to be known. */
export const remark = (kind: string, message: string, count: number | null): ReadinessFinding => ({
  kind,
  severity: "remark",
  message,
  remedy: null,
  count,
});
