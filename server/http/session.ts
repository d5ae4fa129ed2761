import { fromNodeHeaders } from "better-auth/node";
import type { RequestHandler, Response } from "express";
import type { Account } from "../../shared/schemas/resources.ts";
import { notSignedIn } from "../errors.ts";
import type { Authentication } from "../services/authentication.ts";

export interface Session {
  readonly account: Account;
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
  return { account: { id: user.id, name: user.name, email: user.email }, expiresAt: session.expiresAt };
}

export function readSession(auth: Authentication): RequestHandler {
  return async (request, response, next) => {
    response.locals.account = (await sessionOf(auth, request.headers))?.account;
    next();
  };
}

/** The account the request comes from, or a 401. */
export function signedIn(response: Response): Account {
  const account = response.locals.account as Account | undefined;
  if (account === undefined) throw notSignedIn();
  return account;
}
