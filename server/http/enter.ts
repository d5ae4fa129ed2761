import { fromNodeHeaders } from "better-auth/node";
import type { Request, Response } from "express";
import type { Authentication } from "../services/authentication.ts";

/** Signs someone in whose account has just been made: the answer carries the session's cookie. */
export type Enter = (
  request: Request,
  response: Response,
  credentials: { readonly email: string; readonly password: string },
) => Promise<void>;

export const enterBy =
  (auth: Authentication): Enter =>
  async (request, response, body) => {
    const headers = fromNodeHeaders({ ...request.headers, "x-client-ip": request.ip });
    headers.delete("content-length");
    const answer = await auth.api.signInEmail({ body, headers, asResponse: true });
    if (!answer.ok) throw new Error(`An account that was just made does not open: ${answer.status}`);
    for (const cookie of answer.headers.getSetCookie()) response.append("set-cookie", cookie);
  };
