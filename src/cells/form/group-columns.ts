import { uploadRead } from "../../../shared/study/uploads.ts";
import type { FormProps } from "../types.ts";

const isMap = (value: unknown): value is Record<string, unknown> => typeof value === "object" && value !== null;

/** Columns that rows may be grouped by: derived ones, then those of the upload that are no purchase and no weight. */
export function groupColumns({ uploads }: FormProps["context"], data: Record<string, unknown>): string[] {
  const upload = uploadRead(uploads, data);
  const goods = isMap(data.goods) ? Object.values(data.goods) : [];
  const taken = new Set([
    ...goods.flatMap((mapping) => (isMap(mapping) ? Object.values(mapping) : [])),
    data.weight,
    data.total,
  ]);
  const derived = isMap(data.derive) ? Object.keys(data.derive) : [];
  return [...derived, ...(upload?.columns.map(({ name }) => name) ?? [])].filter((name) => !taken.has(name));
}
