import { randomUUID } from "node:crypto";
import type { RequestHandler } from "express";
import { type Logger, pino } from "pino";
import { pinoHttp } from "pino-http";

export function createLogger(level: string, destination?: NodeJS.WritableStream): Logger {
  return pino({ level, base: undefined }, destination ?? pino.destination({ fd: 2, sync: false }));
}

/**
 * One line a request, with an id of its own. What is named here is all that is written: no header,
 * no query, no address of a client, no body, and of a link only that it was one.
 */
export function logRequests(logger: Logger): RequestHandler {
  return pinoHttp({
    logger,
    genReqId: (_request, response) => {
      const id = randomUUID();
      response.setHeader("x-request-id", id);
      return id;
    },
    serializers: {
      req: (request: { id: unknown; method: string; url: string }) => ({
        id: request.id,
        method: request.method,
        path: withoutSecrets(request.url),
      }),
      res: (response: { statusCode: number }) => ({ status: response.statusCode }),
      err: (error: { type: string; message: string; stack: string }) => ({
        type: error.type,
        message: withoutSecrets(error.message),
        stack: withoutSecrets(error.stack),
      }),
    },
    customLogLevel: (_request, response, error) => {
      if (error !== undefined || response.statusCode >= 500) return "error";
      return "info";
    },
  }) as RequestHandler;
}

/** Before the secret of a link, in the addresses of pages and of the API. */
const SECRET =
  /(\/(?:referee|invitations?|create-account|confirm-address|reset-passphrase|account-links|address-links)\/)[^/\s]+/gi;

/** The path without its query, and without the secret of a link; addresses are routed whatever their capitals. */
export function withoutSecrets(text: string): string {
  return text.replace(/\?\S*/g, "").replace(SECRET, "$1…");
}
