import { Router } from "express";
import type { Services } from "../app.ts";

export function accessRoutes(_services: Services): Router {
  return Router();
}
