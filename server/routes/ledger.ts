import { Router } from "express";
import type { Services } from "../app.ts";

export function ledgerRoutes(_services: Services): Router {
  return Router();
}
