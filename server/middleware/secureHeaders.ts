import type { RequestHandler } from "express";
import helmet from "helmet";
import type { Config } from "../config.ts";

/** Content policy and the usual headers. Over plain HTTP nothing is upgraded, so that a loopback installation works. */
export function secureHeaders(config: Config): RequestHandler {
  const isHttps = config.publicUrl.startsWith("https:");
  return helmet({
    contentSecurityPolicy: {
      directives: {
        defaultSrc: ["'self'"],
        // React sets style attributes for positions in charts.
        styleSrc: ["'self'", "'unsafe-inline'"],
        imgSrc: ["'self'", "data:", "blob:"],
        frameAncestors: ["'none'"],
        upgradeInsecureRequests: isHttps ? [] : null,
      },
    },
    strictTransportSecurity: isHttps ? { maxAge: 31_536_000, includeSubDomains: true } : false,
  });
}
