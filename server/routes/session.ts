import { Router } from "express";
import type { Services } from "../app.ts";

export function sessionRoutes(_services: Services): Router {
  return Router();
}
