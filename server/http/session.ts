import { fromNodeHeaders } from "better-auth/node";
import type { RequestHandler, Response } from "express";
import type { Account } from "../../shared/schemas/resources.ts";
import { notSignedIn } from "../errors.ts";
import type { Authentication } from "../services/authentication.ts";

/** Who a request comes from, by its session cookie; the socket's upgrade asks the same. */
export async function accountOf(
  auth: Authentication,
  headers: NodeJS.Dict<string | string[]>,
): Promise<Account | undefined> {
  if (headers.cookie === undefined) return undefined;
  const session = await auth.api.getSession({ headers: fromNodeHeaders(headers) });
  return session === null ? undefined : { id: session.user.id, name: session.user.name, email: session.user.email };
}

export function readSession(auth: Authentication): RequestHandler {
  return async (request, response, next) => {
    response.locals.account = await accountOf(auth, request.headers);
    next();
  };
}

/** The account the request comes from, or a 401. */
export function signedIn(response: Response): Account {
  const account = response.locals.account as Account | undefined;
  if (account === undefined) throw notSignedIn();
  return account;
}
