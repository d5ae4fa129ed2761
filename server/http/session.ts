import { fromNodeHeaders } from "better-auth/node";
import type { RequestHandler, Response } from "express";
import type { Account } from "../../shared/schemas/resources.ts";
import { notSignedIn } from "../errors.ts";
import type { Authentication } from "../services/authentication.ts";

/** Whoever is signed in, by which session. */
export interface SignedIn extends Account {
  /** Someone has read a message sent to the address. */
  readonly emailVerified: boolean;
  readonly sessionId: string;
}

export interface Session {
  readonly account: SignedIn;
  readonly expiresAt: Date;
}

/** Who a request comes from, by its session cookie; the socket's upgrade asks the same. */
export async function sessionOf(
  auth: Authentication,
  headers: NodeJS.Dict<string | string[]>,
): Promise<Session | undefined> {
  if (headers.cookie === undefined) return undefined;
  const found = await auth.api.getSession({ headers: fromNodeHeaders(headers) });
  if (found === null) return undefined;
  const { user, session } = found;
  const { id, name, email, emailVerified } = user;
  return { account: { id, name, email, emailVerified, sessionId: session.id }, expiresAt: session.expiresAt };
}

export function readSession(auth: Authentication): RequestHandler {
  return async (request, response, next) => {
    response.locals.account = (await sessionOf(auth, request.headers))?.account;
    next();
  };
}

/** The account the request comes from, or a 401. */
export function signedIn(response: Response): SignedIn {
  const account = response.locals.account as SignedIn | undefined;
  if (account === undefined) throw notSignedIn();
  return account;
}
