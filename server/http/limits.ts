import type { Request, RequestHandler } from "express";
import { ipKeyGenerator, type Options, rateLimit } from "express-rate-limit";
import { tooMany } from "../errors.ts";

const MINUTE = 60_000;

function limit(what: string, options: Partial<Options>): RequestHandler {
  return rateLimit({
    standardHeaders: "draft-7",
    legacyHeaders: false,
    // Whether proxies are believed is the configuration's to say; their headers are no fault.
    validate: { xForwardedForHeader: false, forwardedHeader: false },
    ...options,
    handler: (_request, response, next) => {
      const seconds = response.getHeader("retry-after");
      next(tooMany(`Too many ${what}; try again in ${seconds ?? 60} seconds.`));
    },
  });
}

/** By the client's address: every sign-in and new account. */
export function limitSignIns(perMinute: number): RequestHandler {
  return limit("sign-ins from here", { windowMs: MINUTE, limit: perMinute });
}

/** By the account's address: failures only, so that nobody is locked out by signing in often. */
export function limitFailedSignIns(): RequestHandler {
  return limit("failed sign-ins for this address", {
    windowMs: 15 * MINUTE,
    limit: 50,
    skipSuccessfulRequests: true,
    keyGenerator: (request: Request) => String(request.body?.email ?? "").toLowerCase(),
  });
}

export function limitUploads(perHour: number): RequestHandler {
  return limit("uploads", {
    windowMs: 60 * MINUTE,
    limit: perHour,
    keyGenerator: (request, response) => response.locals.account?.id ?? ipKeyGenerator(request.ip ?? ""),
  });
}

/** Writing remarks and replies, by the account. */
export function limitRemarks(perMinute: number): RequestHandler {
  return limit("remarks", {
    windowMs: MINUTE,
    limit: perMinute,
    keyGenerator: (request, response) => response.locals.account?.id ?? ipKeyGenerator(request.ip ?? ""),
  });
}

export function limitRefereeReads(perMinute: number): RequestHandler {
  return limit("referee links opened from here", { windowMs: MINUTE, limit: perMinute });
}
