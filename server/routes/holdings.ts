import { Router } from "express";
import type { Services } from "../app.ts";

export function holdingsRoutes(_services: Services): Router {
  return Router();
}
