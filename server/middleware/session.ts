import { Router } from "express";
import type { Services } from "../app.ts";

export function sessions(_services: Services): Router {
  return Router();
}
