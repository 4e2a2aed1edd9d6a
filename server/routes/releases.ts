import { Router } from "express";
import type { Services } from "../app.ts";

export function releaseRoutes(_services: Services): Router {
  return Router();
}
