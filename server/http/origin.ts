import type { RequestHandler } from "express";
import { foreignOrigin } from "../errors.ts";

const READING = new Set(["GET", "HEAD", "OPTIONS"]);

/**
 * Refuses changes asked for by another site's page. A browser names the page's origin on every such
 * request; a program without one carries no cookie that it was not given on purpose.
 */
export function ownPagesOnly(trusted: readonly string[]): RequestHandler {
  return (request, _response, next) => {
    const origin = request.get("origin");
    const site = request.get("sec-fetch-site");
    if (READING.has(request.method)) return next();
    if (origin === undefined ? site === undefined || site === "same-origin" : trusted.includes(origin)) return next();
    throw foreignOrigin(
      `Asked from ${origin ?? "a page of another site"}, and this installation answers pages of ${trusted.join(", ")}.`,
    );
  };
}
