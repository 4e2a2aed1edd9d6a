import { Router } from "express";
import type { Services } from "../app.ts";

export function healthRoutes(_services: Services): Router {
  return Router();
}
