import { Refusal } from "../refusal.ts";

/** What a list of rows is about: what is said, and of which goods; or the reason for leaving rows out. */
export type RowsSubject =
  | readonly ["zeros" | "outliers" | "unit values" | "price variation", good: string]
  | readonly ["collinearity", good: string, other: string]
  | readonly ["shares"]
  | readonly ["left out", reason: string];

const GOODS_NAMED: Readonly<Record<string, number>> = {
  zeros: 1,
  outliers: 1,
  "unit values": 1,
  "price variation": 1,
  collinearity: 2,
  shares: 0,
  "left out": 1,
};

/** The key under which the rows are asked for; names may hold any sign, so that it is written as JSON. */
export const subjectKey = (subject: RowsSubject): string => JSON.stringify(subject);

export function readSubject(key: string): RowsSubject {
  let subject: unknown;
  try {
    subject = JSON.parse(key);
  } catch {
    subject = undefined;
  }
  const words = Array.isArray(subject) && subject.every((word) => typeof word === "string") ? subject : [];
  if (words.length === 0 || GOODS_NAMED[words[0]] !== words.length - 1) {
    throw new Refusal("There are no rows to look at under this name.");
  }
  return words as unknown as RowsSubject;
}
