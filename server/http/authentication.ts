import { toNodeHandler } from "better-auth/node";
import { type Response as Answer, type Request, Router } from "express";
import { z } from "zod";
import type { Limits } from "../config.ts";
import { foreignOrigin, ServiceError } from "../errors.ts";
import { type Authentication, LONGEST_PASSPHRASE, SHORTEST_PASSPHRASE } from "../services/authentication.ts";
import { presentError } from "./errors.ts";
import { limitFailedSignIns, limitSignIns } from "./limits.ts";
import { sessionOf } from "./session.ts";
import { validate } from "./validate.ts";

const email = z.email("is not an e-mail address").trim().max(254, "has more than 254 characters");

const passphrase = z.string("a passphrase is needed").superRefine((words, context) => {
  const length = words.length;
  if (length >= SHORTEST_PASSPHRASE && length <= LONGEST_PASSPHRASE) return;
  const bound =
    length < SHORTEST_PASSPHRASE ? `needs at least ${SHORTEST_PASSPHRASE}` : `may have ${LONGEST_PASSPHRASE}`;
  context.addIssue({ code: "custom", message: `the passphrase has ${length} characters and ${bound}` });
});

const newAccount = z.object({
  name: z.string("a name is needed").trim().min(1, "a name is needed").max(100, "has more than 100 characters"),
  email,
  password: passphrase,
});
const signIn = z.object({ email, password: z.string("a passphrase is needed").max(LONGEST_PASSPHRASE) });

interface Settings {
  readonly auth: Authentication;
  readonly limits: Limits;
  /** Told after someone has signed out. */
  readonly signedOut: (userId: string) => void;
}

/** The four doors of the authentication package that this program opens, with its refusals in our words. */
export function authenticationRoutes({ auth, limits, signedOut }: Settings): Router {
  const router = Router();
  const pass = toNodeHandler(async (request: globalThis.Request) => inOurWords(await auth.handler(request)));
  const forward = (request: Request, response: Answer) => {
    request.headers["x-client-ip"] = request.ip;
    return pass(request, response);
  };
  const bySignIns = limitSignIns(limits.signInsPerMinute);

  router.post("/sign-up/email", bySignIns, (request, response) => {
    request.body = validate(newAccount, request.body);
    return forward(request, response);
  });
  router.post("/sign-in/email", bySignIns, limitFailedSignIns(), (request, response) => {
    request.body = validate(signIn, request.body);
    return forward(request, response);
  });
  router.post("/sign-out", async (request, response) => {
    const session = await sessionOf(auth, request.headers);
    await forward(request, response);
    if (session !== undefined && response.statusCode < 400) signedOut(session.account.id);
  });
  router.get("/get-session", forward);
  return router;
}

const SENTENCES: Record<string, string> = {
  INVALID_EMAIL_OR_PASSWORD: "This address and this passphrase do not belong together.",
  USER_ALREADY_EXISTS: "There is an account with this address already: sign in with it.",
  USER_ALREADY_EXISTS_USE_ANOTHER_EMAIL: "There is an account with this address already: sign in with it.",
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
