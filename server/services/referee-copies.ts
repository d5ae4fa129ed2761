import { createHash, randomBytes, randomUUID } from "node:crypto";
import type { CellKind, FindingOf } from "../../shared/schemas/cell.ts";
import { type RefereeCopy, type SealedContent, sealedContent } from "../../shared/schemas/referee-copy.ts";
import type { CellStatus } from "../../shared/schemas/status.ts";
import { canonicalJson } from "../../shared/study/canonical-json.ts";
import type { CellSource } from "../../shared/study/cell-source.ts";
import { sha256Hex } from "../../shared/study/fingerprint.ts";
import { parseCell } from "../../shared/study/parse-cell.ts";
import type { Database } from "../db/client.ts";
import { peopleOf } from "../db/queries/people.ts";
import {
  changeRefereeCopy,
  findRefereeCopy,
  insertRefereeCopy,
  openRefereeCopy,
  type RefereeCopySummaryRow,
  refereeCopiesOf,
} from "../db/queries/referee-copies.ts";
import { findStudy } from "../db/queries/studies.ts";
import { conflict, notFound } from "../errors.ts";
import type { Actor } from "../policies/can.ts";
import { type Access, noSuchStudy } from "./access.ts";
import type { RecordInJournal } from "./journal.ts";
import type { Cells, SourcesOf } from "./ports.ts";
import { type SealedCells, sealedContentOf } from "./sealed-content.ts";

export type { RefereeCopySummaryRow };

interface Collaborators {
  readonly db: Database;
  readonly access: Access;
  readonly cells: Pick<Cells, "status" | "finding">;
  readonly sourcesOf: SourcesOf;
  /** Name and version, for the copy to say what sealed it. */
  readonly program: string;
  readonly record: RecordInJournal;
}

interface Wanted {
  readonly cellId: string;
  readonly note: string;
  readonly withholdAuthors: boolean;
}

export type RefereeCopyService = ReturnType<typeof createRefereeCopyService>;

export function createRefereeCopyService({ db, access, cells, sourcesOf, program, record }: Collaborators) {
  /** The current finding of a cell with its source; throws when the cell has another state. */
  async function current<K extends CellKind>(studyId: string, status: CellStatus, kind: K) {
    if (status.kind !== kind) throw conflict(`${status.name} is a ${status.kind} cell; a ${kind} cell is needed here.`);
    if (status.state !== "current" || status.fingerprint === undefined) {
      const because = status.because === undefined ? "" : ` (${status.because.replace(/\.$/, "")})`;
      throw conflict(`${status.name} is ${status.state}${because}, and only a current finding is sealed.`);
    }
    const stored = await cells.finding(studyId, status.fingerprint);
    const cell = (await sourcesOf(studyId)).find(({ id }) => id === status.cellId);
    if (stored === undefined || cell === undefined) throw conflict(`${status.name} is changing; seal it again.`);
    return { cell, finding: stored.finding as FindingOf<K> };
  }

  async function sealedCells(studyId: string, cellId: string): Promise<SealedCells> {
    const all = (await cells.status(studyId)).cells;
    const wanted = all.find((status) => status.cellId === cellId);
    if (wanted === undefined) throw notFound("There is no such cell in this study.");
    const matrix = await current(studyId, wanted, "slutsky");
    const system = await current(studyId, readBy(all, wanted), "system");
    const data = await current(studyId, readBy(all, readBy(all, wanted)), "data");
    refuseOneHousehold(matrix.cell, matrix.finding.pointName);
    return { matrix, system, data };
  }

  return {
    list(actor: Actor, studyId: string): RefereeCopySummaryRow[] {
      access.allow(actor, "referee copy.read", studyId);
      return refereeCopiesOf(db, studyId);
    },

    /** The token is told here and never again: only its hash is kept. */
    async seal(actor: Actor, studyId: string, wanted: Wanted): Promise<{ copy: RefereeCopySummaryRow; token: string }> {
      access.allow(actor, "referee copy.seal", studyId);
      const study = findStudy(db, studyId);
      if (study === undefined) throw noSuchStudy();
      const sealed = await sealedCells(studyId, wanted.cellId);
      const sealedAt = new Date();
      const authors = wanted.withholdAuthors ? undefined : authorsOf(studyId);
      const content = sealedContent.parse(
        sealedContentOf({ program, title: study.title, authors, note: wanted.note, sealedAt }, sealed),
      );
      const token = randomBytes(32).toString("base64url");
      const id = randomUUID();
      insertRefereeCopy(db, {
        id,
        studyId,
        tokenHash: hashOf(token),
        cellName: sealed.matrix.cell.name,
        note: wanted.note,
        fingerprint: sha256Hex(canonicalJson(content)),
        content: JSON.stringify(content),
        sealedBy: actor.id,
        sealedAt,
        revokedAt: null,
        lastOpenedAt: null,
      });
      record({ studyId, actor, action: "referee copy sealed", subject: sealed.matrix.cell.name });
      return { copy: copyOf(studyId, id), token };
    },

    revoke(actor: Actor, studyId: string, copyId: string): RefereeCopySummaryRow {
      access.allow(actor, "referee copy.revoke", studyId);
      const { revokedAt, cellName } = copyOf(studyId, copyId);
      if (revokedAt === null) {
        changeRefereeCopy(db, copyId, { revokedAt: new Date() });
        record({ studyId, actor, action: "referee copy revoked", subject: cellName });
      }
      return copyOf(studyId, copyId);
    },

    /** For whoever has the link. A wrong and a revoked one get the same answer after the same work. */
    open(token: string): RefereeCopy {
      const found = openRefereeCopy(db, hashOf(token));
      if (found === undefined) throw notFound("Nothing can be read under this link.");
      changeRefereeCopy(db, found.id, { lastOpenedAt: new Date() });
      return { fingerprint: found.fingerprint, content: JSON.parse(found.content) as SealedContent };
    },
  };

  function copyOf(studyId: string, copyId: string): RefereeCopySummaryRow {
    const copy = findRefereeCopy(db, studyId, copyId);
    if (copy === undefined) throw notFound("There is no such referee copy of this study.");
    return copy;
  }

  function authorsOf(studyId: string): string[] {
    return peopleOf(db, studyId)
      .filter(({ role }) => role !== "reader")
      .map(({ name }) => name);
  }
}

/** The other cell that a cell reads, as its source names it first. */
function readBy(all: readonly CellStatus[], reader: CellStatus): CellStatus {
  const read = all.find(({ name }) => name === reader.reads[0]);
  if (read === undefined)
    throw conflict(`${reader.name} reads ${reader.reads[0] ?? "no cell"}, which is not in the study.`);
  return read;
}

/** Quantiles nearer the ends than this are the total of the poorest or the richest household asked. */
const OUTERMOST_QUANTILE = 0.01;

/** A matrix at a row of the upload would show a referee that household's prices and total. */
function refuseOneHousehold({ name, source }: CellSource, pointName: string): void {
  const { specification } = parseCell("slutsky", source);
  if (specification?.kind !== "slutsky") throw conflict(`${name} is changing; seal it again.`);
  const { at } = specification;
  if (typeof at === "string" || "prices" in at) return;
  if ("row" in at) {
    throw conflict(
      `${name} stands at ${pointName}, the prices and total of one household: seal it at the base point or the mean.`,
    );
  }
  const fraction = Number(at.x.slice("quantile ".length));
  if (fraction >= OUTERMOST_QUANTILE && fraction <= 1 - OUTERMOST_QUANTILE) return;
  throw conflict(
    `${name} stands at ${pointName}, the total of one household: seal it at a quantile from ${OUTERMOST_QUANTILE} to ${1 - OUTERMOST_QUANTILE}.`,
  );
}

function hashOf(token: string): string {
  return createHash("sha256").update(token).digest("hex");
}
