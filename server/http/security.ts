import type { RequestHandler } from "express";
import helmet from "helmet";

/**
 * What a browser is told not to do with our pages. In development Vite's own scripts are inline;
 * nowhere else is an inline script let through.
 */
export function protectPages({ secure, development }: { secure: boolean; development: boolean }): RequestHandler {
  return helmet({
    referrerPolicy: { policy: "no-referrer" },
    strictTransportSecurity: secure,
    contentSecurityPolicy: {
      directives: {
        defaultSrc: ["'self'"],
        scriptSrc: development ? ["'self'", "'unsafe-inline'"] : ["'self'"],
        // Plotly, CodeMirror and KaTeX write style attributes.
        styleSrc: ["'self'", "'unsafe-inline'"],
        imgSrc: ["'self'", "data:", "blob:"],
        fontSrc: ["'self'", "data:"],
        workerSrc: ["'self'", "blob:"],
        connectSrc: ["'self'"],
        objectSrc: ["'none'"],
        frameAncestors: ["'none'"],
        upgradeInsecureRequests: secure ? [] : null,
      },
    },
  });
}

/** Answers of the API are one person's and of one moment. */
export const neverKept: RequestHandler = (_request, response, next) => {
  response.set("cache-control", "no-store").set("x-robots-tag", "noindex");
  next();
};
