import { Router } from "express";
import type { Services } from "../app.ts";

export function accountRoutes(_services: Services): Router {
  return Router();
}
