import { z } from "zod";

/** A finite double; JSON has no NaN or infinity, and neither has any finding. */
export const finite = z.number().finite();
export const count = z.number().int().nonnegative();
export const vector = z.array(finite);
export const matrix = z.array(vector);
/** SHA-256 in lower-case hexadecimal. */
export const fingerprint = z.string().regex(/^[0-9a-f]{64}$/);
/** ISO 8601 with time zone. */
export const instant = z.iso.datetime();
export const identifier = z.string().min(1).max(64);

/** A cell's name: how other cells refer to it. A letter, then letters, digits, space, - or _. */
export const cellName = z
  .string()
  .max(60)
  .regex(
    /^\p{L}[\p{L}\p{N} _-]*$/u,
    "a cell's name begins with a letter and has letters, digits, spaces, - and _ only",
  );

/** A column of an upload, or a derived one, by its name. */
export const columnName = z.string().min(1).max(200);
/** The name of a good. */
export const goodName = z.string().min(1).max(80);
