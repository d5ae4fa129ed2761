import type { Request, RequestHandler, Response } from "express";
import { ipKeyGenerator, type Options, rateLimit } from "express-rate-limit";
import { tooMany } from "../errors.ts";

const MINUTE = 60_000;

function limit(what: string, options: Partial<Options>, refused?: (request: Request) => void): RequestHandler {
  return rateLimit({
    standardHeaders: "draft-7",
    legacyHeaders: false,
    // Whether proxies are believed is the configuration's to say; their headers are no fault.
    validate: { xForwardedForHeader: false, forwardedHeader: false },
    ...options,
    handler: (request, response, next) => {
      refused?.(request);
      const seconds = response.getHeader("retry-after");
      next(tooMany(`Too many ${what}; try again in ${seconds ?? 60} seconds.`));
    },
  });
}

/** By the account where someone is signed in, else by the client's address. */
function byAccount(request: Request, response: Response): string {
  return response.locals.account?.id ?? ipKeyGenerator(request.ip ?? "");
}

/** By the client's address: every sign-in and new account. */
export function limitSignIns(perMinute: number): RequestHandler {
  return limit("sign-ins from here", { windowMs: MINUTE, limit: perMinute });
}

const FAILED_SIGN_INS = 50;

/**
 * By the account's address: failures only, so that nobody is locked out by signing in often. `locked` is told once of
 * an address, when it is locked.
 */
export function limitFailedSignIns(locked: (email: string) => void): RequestHandler {
  const emailOf = (request: Request) => String(request.body?.email ?? "").toLowerCase();
  return limit(
    "failed sign-ins for this address",
    { windowMs: 15 * MINUTE, limit: FAILED_SIGN_INS, skipSuccessfulRequests: true, keyGenerator: emailOf },
    (request) => {
      const { used } = (request as Request & { rateLimit?: { used: number } }).rateLimit ?? { used: 0 };
      if (used === FAILED_SIGN_INS + 1) locked(emailOf(request));
    },
  );
}

/** Wrong passphrases of someone who is signed in, by the account. */
export function limitPassphrases(): RequestHandler {
  return limit("wrong passphrases", {
    windowMs: 15 * MINUTE,
    limit: 20,
    skipSuccessfulRequests: true,
    keyGenerator: byAccount,
  });
}

/** Messages to one address are nobody's way to pester it. */
const MAILS_TO_ADDRESS = 10;

/** What makes a message leave: by who causes it, and by whom it goes to. The two count an address alike, known or not. */
export function limitMail(perHour: number): RequestHandler[] {
  const toWhom = (request: Request) => String(request.body?.email ?? request.params.invitationId ?? "").toLowerCase();
  return [
    limit("messages asked for from here", { windowMs: 60 * MINUTE, limit: perHour, keyGenerator: byAccount }),
    limit("messages to this address", { windowMs: 60 * MINUTE, limit: MAILS_TO_ADDRESS, keyGenerator: toWhom }),
  ];
}

/** Links opened from here, whatever they open. */
export function limitLinks(perMinute: number): RequestHandler {
  return limit("links opened from here", { windowMs: MINUTE, limit: perMinute });
}

export function limitUploads(perHour: number): RequestHandler {
  return limit("uploads", {
    windowMs: 60 * MINUTE,
    limit: perHour,
    keyGenerator: byAccount,
  });
}

/** Writing remarks and replies, by the account. */
export function limitRemarks(perMinute: number): RequestHandler {
  return limit("remarks", {
    windowMs: MINUTE,
    limit: perMinute,
    keyGenerator: byAccount,
  });
}

export function limitRefereeReads(perMinute: number): RequestHandler {
  return limit("referee links opened from here", { windowMs: MINUTE, limit: perMinute });
}
