import { Router } from "express";
import type { Services } from "../app.ts";

export function questionRoutes(_services: Services): Router {
  return Router();
}
