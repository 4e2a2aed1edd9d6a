import path from "node:path";
import { fileURLToPath } from "node:url";
import express, { Router } from "express";

const CLIENT_FOLDER = fileURLToPath(new URL("../../dist/client/", import.meta.url));

/** The built pages; any address without a file gets the page that routes in the browser. */
export function serveClient(folder: string = CLIENT_FOLDER): Router {
  const router = Router();
  router.use("/assets", express.static(path.join(folder, "assets"), { immutable: true, maxAge: "1y", fallthrough: false }));
  router.use(express.static(folder, { index: false }));
  router.get("/{*address}", (_request, response) => {
    response.set("Cache-Control", "no-store").sendFile(path.join(folder, "index.html"));
  });
  return router;
}
