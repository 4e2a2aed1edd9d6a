import { Router } from "express";
import type { Services } from "../app.ts";
import { migrations } from "../migrations/migrate.ts";

/** `GET /api/health`: 200 once questions can be asked, that is, the database answers and its tables are up to date. */
export function healthRoutes({ sequelize }: Services): Router {
  const router = Router();
  router.get("/health", async (_request, response) => {
    const isReady = await migrations(sequelize)
      .pending()
      .then(
        (pending) => pending.length === 0,
        () => false,
      );
    response
      .status(isReady ? 200 : 503)
      .set("Cache-Control", "no-store")
      .json({ status: isReady ? "ready" : "not ready" });
  });
  return router;
}
