import { toNodeHandler } from "better-auth/node";
import { type Response as Answer, type Request, type RequestHandler, Router } from "express";
import { addressAsked, changedPassphrase, resetPassphrase, signIn } from "../../shared/schemas/accounts.ts";
import type { Limits } from "../config.ts";
import { foreignOrigin, notSignedIn, ServiceError } from "../errors.ts";
import type { Authentication } from "../services/authentication.ts";
import { presentError } from "./errors.ts";
import { limitFailedSignIns, limitPassphrases, limitSignIns } from "./limits.ts";
import { type SignedIn, sessionOf } from "./session.ts";
import { validate } from "./validate.ts";

interface Settings {
  readonly auth: Authentication;
  readonly limits: Limits;
  readonly limitMail: RequestHandler[];
  /** Told when an address has had too many wrong passphrases. */
  readonly locked: (email: string) => void;
  /** Told after someone has changed their passphrase; every other session of theirs ends. */
  readonly passphraseChanged: (account: SignedIn) => Promise<void>;
}

/** The doors of the authentication package that this program opens, with its refusals in our words. */
export function authenticationRoutes({ auth, limits, limitMail, locked, passphraseChanged }: Settings): Router {
  const router = Router();
  const pass = toNodeHandler(async (request: globalThis.Request) => inOurWords(await auth.handler(request)));
  const forward = (request: Request, response: Answer) => {
    request.headers["x-client-ip"] = request.ip;
    return pass(request, response);
  };
  const bySignIns = limitSignIns(limits.signInsPerMinute);

  router.post("/sign-in/email", bySignIns, limitFailedSignIns(locked), (request, response) => {
    request.body = validate(signIn, request.body);
    return forward(request, response);
  });
  router.post("/sign-out", forward);
  router.get("/get-session", forward);

  // The same answer whether an account has the address or not.
  router.post("/request-password-reset", ...limitMail, async (request, response) => {
    const { email } = validate(addressAsked, request.body);
    await auth.api.requestPasswordReset({ body: { email } });
    response.status(202).end();
  });
  router.post("/reset-password", bySignIns, (request, response) => {
    request.body = validate(resetPassphrase, request.body);
    return forward(request, response);
  });
  router.post("/change-password", limitPassphrases(), async (request, response) => {
    const session = await sessionOf(auth, request.headers);
    if (session === undefined) throw notSignedIn();
    request.body = validate(changedPassphrase, request.body);
    await forward(request, response);
    if (response.statusCode < 400) await passphraseChanged(session.account);
  });
  return router;
}

const SENTENCES: Record<string, string> = {
  INVALID_EMAIL_OR_PASSWORD: "This address and this passphrase do not belong together.",
  INVALID_PASSWORD: "This is not the passphrase you have now.",
  INVALID_TOKEN: "This link has been used or has run out. Ask for another.",
};

async function inOurWords(response: Response): Promise<Response> {
  const body: unknown = await response
    .clone()
    .json()
    .catch(() => null);
  const headers = new Headers(response.headers);
  headers.delete("content-length");
  if (response.ok) return new Response(JSON.stringify(withoutToken(body)), { status: response.status, headers });
  const { code = "invalid", message = "The request cannot be answered." } = (body ?? {}) as Record<string, string>;
  const refusal =
    response.status === 403
      ? foreignOrigin("This page is not one of this installation's own.")
      : new ServiceError(response.status, code.toLowerCase().replaceAll("_", " "), SENTENCES[code] ?? message);
  headers.set("content-type", "application/json");
  return new Response(JSON.stringify(presentError(refusal)), { status: response.status, headers });
}

/** The session's token belongs in its cookie, where no script reads it. */
function withoutToken(body: unknown): unknown {
  if (typeof body !== "object" || body === null) return body;
  const { token: _token, ...rest } = body as Record<string, unknown>;
  if (typeof rest.session !== "object" || rest.session === null) return rest;
  const { token: _sessionToken, ...session } = rest.session as Record<string, unknown>;
  return { ...rest, session };
}
