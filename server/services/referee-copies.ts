import { randomUUID } from "node:crypto";
import type { NewRefereeCopy } from "../../shared/schemas/referee-copies.ts";
import { type RefereeCopy, type SealedContent, sealedContent } from "../../shared/schemas/referee-copy.ts";
import { canonicalJson } from "../../shared/study/canonical-json.ts";
import { sha256Hex } from "../../shared/study/fingerprint.ts";
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
import { conflict, invalid, notFound } from "../errors.ts";
import * as texts from "../mail/texts.ts";
import type { Actor } from "../policies/can.ts";
import { type Access, noSuchStudy } from "./access.ts";
import { studyUploads } from "./cells/study-uploads.ts";
import type { RecordInJournal } from "./journal.ts";
import { linkTokenHash, newLinkToken } from "./link-token.ts";
import type { MailService } from "./mail.ts";
import type { Cells, SourcesOf } from "./ports.ts";
import { collectSealedCells } from "./sealed-cells.ts";
import { type SealedCells, sealedContentOf, sourcesSealed } from "./sealed-content.ts";
import { methodsToSeal } from "./sealed-methods.ts";
import { refuseWithheldNames } from "./withheld-names.ts";

export type { RefereeCopySummaryRow };

interface Collaborators {
  readonly db: Database;
  readonly access: Access;
  readonly cells: Pick<Cells, "status" | "finding">;
  readonly sourcesOf: SourcesOf;
  /** Name and version, for the copy to say what sealed it. */
  readonly program: string;
  readonly record: RecordInJournal;
  readonly mail: Pick<MailService, "send">;
  /** Where the pages are, without a slash at its end. */
  readonly url: string;
}

/** A copy with its link's token, which is told here and never again: only its hash is kept. */
interface Told {
  readonly copy: RefereeCopySummaryRow;
  readonly token: string;
}

/** As many copies as a study may have, revoked ones included. */
const MOST_COPIES = 500;
const LONGEST_YEARS = 10;
const YEAR = 365.25 * 24 * 3_600_000;

export type RefereeCopyService = ReturnType<typeof createRefereeCopyService>;

export function createRefereeCopyService({ db, access, cells, sourcesOf, program, record, mail, url }: Collaborators) {
  const sealedCells = collectSealedCells({ cells, sourcesOf });

  function copyOf(studyId: string, copyId: string): RefereeCopySummaryRow {
    const copy = findRefereeCopy(db, studyId, copyId);
    if (copy === undefined) throw notFound("There is no such referee copy of this study.");
    return copy;
  }

  const authorsOf = (studyId: string) => peopleOf(db, studyId).filter(({ role }) => role !== "reader");

  /** The cells of a copy, with the methods of its systems where they are asked for. */
  async function collected(studyId: string, { cellId, also, methods }: NewRefereeCopy): Promise<SealedCells> {
    const sealed = await sealedCells(studyId, cellId, also);
    if (!methods) return sealed;
    const systems = [sealed.system, ...(sealed.also ?? [])].flatMap(({ cell, finding }) =>
      finding.kind === "system" ? [{ cell, finding }] : [],
    );
    const sources = await sourcesOf(studyId);
    return { ...sealed, methods: methodsToSeal(distinct(systems), sources, studyUploads(db, studyId)) };
  }

  /** Sends the link, without a word of who the authors are where that is withheld. */
  function sendLink(actor: Actor, { studyId, id, expiresAt }: RefereeCopySummaryRow, token: string, to: string): void {
    const { title, authors } = contentOf(id).study;
    mail.send({
      to,
      ...texts.refereeLink({ study: title, authors, link: `${url}/referee/${token}`, until: expiresAt ?? undefined }),
    });
    record({ studyId, actor, action: "referee copy sent", subject: to });
  }

  function contentOf(id: string): SealedContent {
    const found = openRefereeCopy(db, { id }, new Date());
    if (found === undefined) throw conflict("The copy is revoked or has run out: its link opens nothing.");
    return JSON.parse(found.content) as SealedContent;
  }

  /** The last of the copies that replaced one another that still opens. */
  function newestAfter(replacedBy: string | null) {
    let newest: ReturnType<typeof openRefereeCopy>;
    for (let next = replacedBy; next !== null; ) {
      const found = openRefereeCopy(db, { id: next }, new Date());
      if (found === undefined) break;
      newest = found;
      next = found.replacedBy;
    }
    return newest;
  }

  function opened(token: string) {
    const found = openRefereeCopy(db, { tokenHash: linkTokenHash(token) }, new Date());
    if (found === undefined) throw notFound("Nothing can be read under this link.");
    changeRefereeCopy(db, found.id, { lastOpenedAt: new Date() });
    return found;
  }

  return {
    list(actor: Actor, studyId: string): RefereeCopySummaryRow[] {
      access.allow(actor, "referee copy.read", studyId);
      return refereeCopiesOf(db, studyId);
    },

    async seal(actor: Actor, studyId: string, wanted: NewRefereeCopy): Promise<Told> {
      access.allow(actor, "referee copy.seal", studyId);
      const study = findStudy(db, studyId);
      if (study === undefined) throw noSuchStudy();
      const expiresAt = wanted.expiresAt === undefined ? null : end(wanted.expiresAt);
      const replaced = wanted.replaces === undefined ? undefined : copyOf(studyId, wanted.replaces);
      if (replaced !== undefined && replaced.replacedBy !== null) {
        throw conflict("That copy has been replaced already: replace the newer one.");
      }
      const many = refereeCopiesOf(db, studyId).length;
      if (many >= MOST_COPIES) throw conflict(`The study has ${many} referee copies, and may have ${MOST_COPIES}.`);
      const sealed = await collected(studyId, wanted);
      const sealedAt = new Date();
      const { title } = study;
      const { note, withholdAuthors } = wanted;
      const people = authorsOf(studyId);
      if (withholdAuthors) refuseWithheldNames({ authors: people, title, note, cells: sourcesSealed(sealed) });
      const authors = withholdAuthors ? undefined : people.map(({ name }) => name);
      const content = sealedContent.parse(sealedContentOf({ program, title, authors, note, sealedAt }, sealed));
      const { token, tokenHash } = newLinkToken();
      const id = randomUUID();
      const cellName = sealed.matrix.cell.name;
      db.transaction((tx) => {
        insertRefereeCopy(tx, {
          id,
          studyId,
          tokenHash,
          cellName,
          also: (sealed.also ?? []).map(({ cell }) => cell.name),
          note: wanted.note,
          fingerprint: sha256Hex(canonicalJson(content)),
          content: JSON.stringify(content),
          sealedBy: actor.id,
          sealedAt,
          revokedAt: null,
          lastOpenedAt: null,
          expiresAt,
          replacedBy: null,
        });
        if (replaced !== undefined) changeRefereeCopy(tx, replaced.id, { replacedBy: id });
      });
      record({ studyId, actor, action: "referee copy sealed", subject: cellName });
      if (replaced !== undefined) {
        record({ studyId, actor, action: "referee copy replaced", subject: replaced.cellName });
      }
      const copy = copyOf(studyId, id);
      if (wanted.email !== undefined) sendLink(actor, copy, token, wanted.email);
      return { copy, token };
    },

    /** Until when the link opens; null: until it is revoked. */
    change(actor: Actor, studyId: string, copyId: string, expiresAt: string | null): RefereeCopySummaryRow {
      access.allow(actor, "referee copy.change", studyId);
      if (copyOf(studyId, copyId).revokedAt !== null) throw conflict("The copy is revoked: its link opens nothing.");
      changeRefereeCopy(db, copyId, { expiresAt: expiresAt === null ? null : end(expiresAt) });
      return copyOf(studyId, copyId);
    },

    /** A new link where the old one is lost, or has gone to the wrong person: the old one opens nothing from here on. */
    renew(actor: Actor, studyId: string, copyId: string, email: string | undefined): Told {
      access.allow(actor, "referee copy.change", studyId);
      const copy = copyOf(studyId, copyId);
      contentOf(copy.id);
      const { token, tokenHash } = newLinkToken();
      changeRefereeCopy(db, copyId, { tokenHash, lastOpenedAt: null });
      if (email !== undefined) sendLink(actor, copy, token, email);
      return { copy: copyOf(studyId, copyId), token };
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

    /** For whoever has the link. One that is wrong, revoked or run out gets the same answer after the same work. */
    open(token: string): RefereeCopy {
      const { fingerprint, content, replacedBy } = opened(token);
      const newest = newestAfter(replacedBy);
      const newer = newest && { sealedAt: newest.sealedAt.toISOString(), fingerprint: newest.fingerprint };
      return { fingerprint, content: JSON.parse(content) as SealedContent, ...(newer && { newer }) };
    },

    /** The copy that has replaced the one behind the link: its author has it read in that one's place. */
    openNewest(token: string): RefereeCopy {
      const newest = newestAfter(opened(token).replacedBy);
      if (newest === undefined) throw notFound("Nothing has replaced this copy.");
      changeRefereeCopy(db, newest.id, { lastOpenedAt: new Date() });
      return { fingerprint: newest.fingerprint, content: JSON.parse(newest.content) as SealedContent };
    },
  };
}

/** Each cell once: the matrix's system may have been chosen besides. */
function distinct<C extends { readonly cell: { readonly id: string } }>(cells: readonly C[]): C[] {
  return cells.filter(({ cell }, place) => cells.findIndex((one) => one.cell.id === cell.id) === place);
}

/** The end of a link: to come, and not out of all sight. */
function end(instant: string): Date {
  const date = new Date(instant);
  const now = Date.now();
  if (date.getTime() <= now) throw invalid(`The link would have run out already, on ${dayOf(date)}.`);
  const latest = new Date(now + LONGEST_YEARS * YEAR);
  if (date <= latest) return date;
  throw invalid(`The link would open until ${dayOf(date)}; at most ${LONGEST_YEARS} years, until ${dayOf(latest)}.`);
}

const dayOf = (date: Date) => date.toISOString().slice(0, 10);
