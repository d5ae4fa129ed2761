import type { z } from "zod";
import type { Problem } from "../../shared/schemas/problem.ts";
import { apiError } from "../../shared/schemas/resources.ts";

/** A refusal of the API, or no answer at all: a sentence for people, and the places it names. */
export class ApiRefusal extends Error {
  override name = "ApiRefusal";
  /** 0 when nothing answered. */
  readonly status: number;
  readonly code: string;
  readonly problems: readonly Problem[];

  constructor(status: number, code: string, sentence: string, problems: readonly Problem[] = []) {
    super(sentence);
    this.status = status;
    this.code = code;
    this.problems = problems;
  }
}

interface Request<T> {
  readonly method?: "GET" | "POST" | "PATCH" | "DELETE";
  readonly path: string;
  readonly body?: unknown;
  readonly signal?: AbortSignal;
  /** What the answer must be; without it the answer's body is not read. */
  readonly answer?: z.ZodType<T>;
}

/** Asks the API of this installation and returns the answer as its schema reads it. */
export async function ask<T = void>({ answer, ...request }: Request<T>): Promise<T> {
  const response = await answerTo(request);
  const text = await response.text();
  if (!response.ok) throw refusalOf(response.status, text);
  return answer ? answer.parse(JSON.parse(text)) : (undefined as T);
}

/** A file that the API of this installation answers with, under the name it is given there. */
export interface AnsweredFile {
  readonly name: string;
  readonly content: Blob;
}

export async function askForFile(request: Omit<Request<void>, "answer">): Promise<AnsweredFile> {
  const response = await answerTo(request);
  if (!response.ok) throw refusalOf(response.status, await response.text());
  const named = /filename="?([^";]+)"?/.exec(response.headers.get("content-disposition") ?? "");
  return { name: named?.[1] ?? "file", content: await response.blob() };
}

async function answerTo({ method = "GET", path, body, signal }: Omit<Request<void>, "answer">): Promise<Response> {
  try {
    return await fetch(path, {
      method,
      credentials: "same-origin",
      headers: { accept: "application/json", ...(body !== undefined && { "content-type": "application/json" }) },
      ...(body !== undefined && { body: JSON.stringify(body) }),
      ...(signal && { signal }),
    });
  } catch (error) {
    if (signal?.aborted) throw error;
    throw unreachable();
  }
}

export function unreachable(): ApiRefusal {
  return new ApiRefusal(0, "unreachable", "The installation does not answer. Check the connection, then try again.");
}

/** The refusal a body tells; better-auth words its own as `message`. */
export function refusalOf(status: number, text: string): ApiRefusal {
  const body = readJson(text);
  const known = apiError.safeParse(body);
  if (known.success) {
    const { code, sentence, problems } = known.data.error;
    return new ApiRefusal(status, code, sentence, problems);
  }
  const message = (body as { message?: unknown } | undefined)?.message;
  const sentence = typeof message === "string" && message ? `${message.replace(/[.\s]+$/, "")}.` : undefined;
  return new ApiRefusal(status, "refused", sentence ?? `The installation answered ${status} and gave no reason.`);
}

function readJson(text: string): unknown {
  try {
    return JSON.parse(text);
  } catch {
    return undefined;
  }
}

/** What to tell a person of whatever went wrong. */
export function sentenceOf(error: unknown): string {
  if (error instanceof ApiRefusal) return error.message;
  return "Something failed here that should not have. Nothing you stored is lost.";
}
