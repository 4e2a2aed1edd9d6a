import { Router } from "express";
import type { Services } from "../app.ts";
import { describeApi } from "../openapi/describe.ts";

/** `GET /api/openapi.json`: the contracts, for whoever scripts against the API. Public, like the contracts themselves. */
export function openapiRoutes({ config }: Services): Router {
  const router = Router();
  const document = describeApi(config.publicUrl);
  router.get("/openapi.json", (_request, response) => {
    response.json(document);
  });
  return router;
}
