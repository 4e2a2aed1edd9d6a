import { Router } from "express";
import type { Services } from "../app.ts";

export function peopleRoutes(_services: Services): Router {
  return Router();
}
