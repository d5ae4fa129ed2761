import { keepPreviousData, useQuery } from "@tanstack/react-query";
import { rowsPage } from "../../../../shared/schemas/rows.ts";
import { ask } from "../../../lib/api.ts";
import { api } from "../../../lib/paths.ts";

/** Whose rows: an upload's, or those that something found of a data cell is about. */
export type RowsOf =
  | { readonly uploadId: string }
  | { readonly cellId: string; readonly about: string; readonly fingerprint: string };

export const ROWS_AT_ONCE = 50;

function pathOf(studyId: string, of: RowsOf, from: number): string {
  const page = { from: String(from), count: String(ROWS_AT_ONCE) };
  if ("uploadId" in of) return `${api.upload(studyId, of.uploadId)}/rows?${new URLSearchParams(page)}`;
  const { about, fingerprint } = of;
  const asked = new URLSearchParams({ about, fingerprint, ...page });
  return `${api.study(studyId)}/cells/${encodeURIComponent(of.cellId)}/rows?${asked}`;
}

/** A page of rows; the page before stays to be seen until the next is here. */
export const useRows = (studyId: string, of: RowsOf, from: number) =>
  useQuery({
    queryKey: ["rows", studyId, of, from],
    queryFn: ({ signal }) => ask({ path: pathOf(studyId, of, from), answer: rowsPage, signal }),
    placeholderData: keepPreviousData,
  });
