import { canonicalJson } from "./canonical-json.ts";
import { readDocument } from "./document.ts";
import { listWords } from "./words.ts";

const MOST_TOLD = 2;

/**
 * What differs between the source a finding was asked with and the source now, key by key:
 * "form changed from la-aids to aids". None when the same is asked in other words.
 */
export function describeChanges(before: string, now: string): string | undefined {
  const [old, fresh] = [keysOf(before), keysOf(now)];
  if (!old || !fresh) return before === now ? undefined : "its source changed";
  const keys = [...new Set([...Object.keys(fresh), ...Object.keys(old)])].filter(
    (key) => !isSame(old[key], fresh[key]),
  );
  if (keys.length === 0) return undefined;
  const told = keys.slice(0, MOST_TOLD).map((key) => changeOf(key, old[key], fresh[key]));
  const more = keys.length - told.length;
  return listWords([...told, ...(more > 0 ? [`${more} more ${more === 1 ? "key" : "keys"} changed`] : [])]);
}

function changeOf(key: string, before: unknown, now: unknown): string {
  if (before === undefined) return `${key} added`;
  if (now === undefined) return `${key} removed`;
  const [from, to] = [inWords(before), inWords(now)];
  return from && to ? `${key} changed from ${from} to ${to}` : `${key} changed`;
}

/** Short values in words; maps and long texts have none. */
function inWords(value: unknown): string | undefined {
  if (Array.isArray(value)) {
    const words = value.map(inWords);
    if (value.length === 0) return "none";
    return words.every((word) => word !== undefined) ? within(listWords(words)) : undefined;
  }
  if (value === null) return "nothing";
  return typeof value === "object" ? undefined : within(String(value));
}

const within = (text: string): string | undefined => (text.length > 40 ? undefined : text);

function keysOf(source: string): Record<string, unknown> | undefined {
  const { value, problems } = readDocument(source);
  if (problems.length > 0 || typeof value !== "object" || Array.isArray(value)) return undefined;
  return (value ?? {}) as Record<string, unknown>;
}

function isSame(left: unknown, right: unknown): boolean {
  if (left === undefined || right === undefined) return left === right;
  return textOf(left) === textOf(right);
}

/** A source may hold .nan or .inf, which JSON cannot. */
function textOf(value: unknown): string {
  try {
    return canonicalJson(value);
  } catch {
    return String(value);
  }
}
