import type { ErrorRequestHandler, RequestHandler } from "express";
import type { ApiError } from "../../shared/schemas/resources.ts";
import { invalid, notFound, ServiceError, tooLarge } from "../errors.ts";

export function presentError({ code, message, problems }: ServiceError): ApiError {
  return { error: { code, sentence: message, problems: [...problems] } };
}

export const nothingHere: RequestHandler = (request) => {
  throw notFound(`Nothing of this program answers ${request.method} at this address.`);
};

/** Every refusal as `apiError`; what nobody foresaw is logged whole and told in one sentence. */
export const answerErrors: ErrorRequestHandler = (error, request, response, next) => {
  if (response.headersSent) return next(error);
  const known = error instanceof ServiceError ? error : fromBodyReader(error);
  if (known === undefined) request.log?.error({ err: error }, "unforeseen");
  const refusal =
    known ??
    new ServiceError(500, "unforeseen", "Something failed here that should not have; nothing you stored is lost.");
  response.status(refusal.status).set("cache-control", "no-store").json(presentError(refusal));
};

/** The refusals of Express's own body readers and of its router. */
function fromBodyReader(error: unknown): ServiceError | undefined {
  if (!(error instanceof Error) || !("status" in error)) return undefined;
  const { type, limit, length } = error as { type?: string; limit?: number; length?: number };
  if (type === "entity.too.large") return tooLarge(`The request has ${length} bytes; at most ${limit} are read.`);
  if (type === "entity.parse.failed") return invalid("The request's body is not JSON.");
  const status = Number(error.status);
  return status >= 400 && status < 500 ? new ServiceError(status, "invalid", "The request cannot be read.") : undefined;
}
