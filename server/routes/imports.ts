import { Router } from "express";
import type { Services } from "../app.ts";

export function importRoutes(_services: Services): Router {
  return Router();
}
