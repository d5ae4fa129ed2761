import { useQueryClient } from "@tanstack/react-query";
import { useCallback, useEffect, useMemo, useState } from "react";
import type { CellSource } from "../../../shared/study/cell-source.ts";
import { fingerprintCells } from "../../../shared/study/fingerprints.ts";
import { inOrder } from "../../../shared/study/order.ts";
import { parseCell, type StudyCell } from "../../../shared/study/parse-cell.ts";
import { resolveParsed } from "../../../shared/study/resolve.ts";
import { useStatus } from "../../features/findings/api/get-status.ts";
import { useUploads } from "../../features/uploads/api/list-uploads.ts";
import { useStudyPart } from "../../sync/index.ts";
import type { OpenStudy } from "./open-study.ts";
import { isSameStanding, type Standing, standingsOf } from "./standing.ts";

const NONE: never[] = [];

/** Where every cell of the open study stands, followed as document, uploads and findings change. */
export function useStandings({ study, connection }: Pick<OpenStudy, "study" | "connection">) {
  const cells = useStudyPart(connection, "cells");
  const told = useStudyPart(connection, "status");
  const { data: first } = useStatus(study.id);
  const { data: uploads, error } = useUploads(study.id);
  const status = told ?? first;
  useUploadsOfOthers(study.id, cells, uploads);
  const parse = useParsed();
  const resolved = useMemo(
    () => (uploads ? resolveParsed(inOrder(cells).map(parse), uploads) : NONE),
    [cells, uploads, parse],
  );
  const standings = useUnchanged(
    useMemo(
      () => standingsOf(cells, resolved, fingerprintCells(resolved, uploads ?? NONE), status),
      [cells, resolved, uploads, status],
    ),
  );
  return { standings, cells, uploads: uploads ?? NONE, error, isKnown: uploads !== undefined && status !== undefined };
}

/** Reads a cell's text once for as long as it stays as it is: whoever types changes one text of many. */
function useParsed(): (cell: CellSource) => StudyCell {
  const [known] = useState(() => new WeakMap<CellSource, StudyCell>());
  return useCallback(
    (cell) => {
      const before = known.get(cell);
      if (before) return before;
      const read = { ...cell, parsed: parseCell(cell.kind, cell.source) };
      known.set(cell, read);
      return read;
    },
    [known],
  );
}

/** Standings that say what they said before are the same objects as before. */
function useUnchanged(standings: readonly Standing[]): readonly Standing[] {
  const [before, setBefore] = useState<readonly Standing[]>(NONE);
  const kept = standings.map((now) => before.find((one) => isSameStanding(one, now)) ?? now);
  const isSame = kept.length === before.length && kept.every((one, place) => one === before[place]);
  if (!isSame) setBefore(kept);
  return isSame ? before : kept;
}

/** A cell that names an upload unknown here may name one a coauthor has just added. */
function useUploadsOfOthers(
  studyId: string,
  cells: readonly { kind: string; source: string }[],
  uploads: readonly { name: string }[] | undefined,
) {
  const client = useQueryClient();
  const named = useMemo(
    () =>
      cells
        .flatMap(({ kind, source }) => (kind === "data" ? (/^upload:\s*(.+?)\s*$/m.exec(source)?.[1] ?? []) : []))
        .map((name) => name.replace(/^(["'])(.*)\1$/, "$2")),
    [cells],
  );
  const unknown = uploads ? named.filter((name) => !uploads.some((upload) => upload.name === name)).join("\n") : "";
  useEffect(() => {
    if (unknown) void client.invalidateQueries({ queryKey: ["uploads", studyId] });
  }, [client, studyId, unknown]);
}
