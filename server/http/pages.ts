import { existsSync } from "node:fs";
import { join } from "node:path";
import express, { Router } from "express";
import { notFound } from "../errors.ts";

/** The built pages: files named by their content are kept for ever, the page itself is asked for each time. */
export function pages(folder: string): Router {
  const router = Router();
  const page = join(folder, "index.html");
  router.use("/assets", express.static(join(folder, "assets"), { immutable: true, maxAge: "365d", index: false }));
  router.use("/assets", () => {
    throw notFound("There is no such file.");
  });
  router.use(express.static(folder, { index: false, maxAge: "1h" }));
  router.get("/{*path}", (_request, response) => {
    if (!existsSync(page)) throw notFound(`The pages are not built: npm run build makes ${page}.`);
    response.set("cache-control", "no-cache").sendFile(page);
  });
  return router;
}
