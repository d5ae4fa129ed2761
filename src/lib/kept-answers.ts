import type { z } from "zod";
import { ApiRefusal } from "./api.ts";

const PREFIX = "tangency-kept/";

/** The installation is away, or is not itself: no answer at all, or one that says so. */
const isAway = (error: unknown): boolean =>
  error instanceof ApiRefusal && (error.status === 0 || [502, 503, 504].includes(error.status));

/**
 * An answer, kept on this machine so that a study can be opened while the installation is away. A refusal is an answer: what
 * was kept before it is forgotten.
 */
export async function orKept<T>(key: string, schema: z.ZodType<T>, answer: Promise<T>): Promise<T> {
  try {
    const value = await answer;
    write(key, value);
    return value;
  } catch (error) {
    if (!(error instanceof ApiRefusal)) throw error;
    if (error.status === 401) forgetKeptAnswers();
    if (!isAway(error)) {
      if (error.status < 500) write(key, undefined);
      throw error;
    }
    const kept = read(key, schema);
    if (kept === undefined) throw error;
    return kept;
  }
}

/** On signing out. */
export function forgetKeptAnswers(): void {
  try {
    for (const key of Object.keys(localStorage)) if (key.startsWith(PREFIX)) localStorage.removeItem(key);
  } catch {
    // What was never kept need not be forgotten.
  }
}

function write(key: string, value: unknown): void {
  try {
    if (value === undefined) localStorage.removeItem(PREFIX + key);
    else localStorage.setItem(PREFIX + key, JSON.stringify(value));
  } catch {
    // A full or closed storage: the study then opens only while the installation is there.
  }
}

function read<T>(key: string, schema: z.ZodType<T>): T | undefined {
  try {
    return schema.parse(JSON.parse(localStorage.getItem(PREFIX + key) ?? ""));
  } catch {
    return undefined;
  }
}
