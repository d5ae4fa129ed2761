import type { Server } from "node:http";
import type { RequestHandler } from "express";

/** The pages from their sources, by Vite within this server: one address, one process. */
export async function developmentPages(root: string, server: Server): Promise<RequestHandler> {
  const { createServer } = await import("vite");
  const vite = await createServer({ root, appType: "spa", server: { middlewareMode: true, hmr: { server } } });
  return vite.middlewares;
}
