import { createHash, randomUUID } from "node:crypto";
import type { OpenDatabase } from "../../server/db/client.ts";
import { uploadColumns } from "../../server/db/schema/uploads.ts";
import { Refusal } from "../../server/engine/refusal.ts";
import type { LookJob } from "../../server/jobs/job.ts";
import type { Cells, ParsedUpload, StoredFinding } from "../../server/services/ports.ts";
import type { Finding } from "../../shared/schemas/cell.ts";
import type { RowsPage } from "../../shared/schemas/rows.ts";
import type { CellStatus, StudyStatus } from "../../shared/schemas/status.ts";
import type { CellSource } from "../../shared/study/cell-source.ts";

/** A fake of the cell service and of the document: cells are what a test puts in, and calls are written down. */
export class FakeCells implements Cells {
  readonly calls: string[] = [];
  readonly #studies = new Map<string, { status: CellStatus; source: CellSource; finding?: Finding }[]>();

  readonly sourcesOf = (studyId: string): CellSource[] => this.#cellsOf(studyId).map(({ source }) => source);

  /** Puts a cell into a study; with a finding it is current. */
  put(studyId: string, cell: Omit<CellSource, "id" | "order">, reads: string[], finding?: Finding, state = "current") {
    const cellId = randomUUID();
    const fingerprint = cellId.replaceAll("-", "").repeat(2);
    const status = {
      cellId,
      name: cell.name,
      kind: cell.kind,
      state: finding === undefined ? "draft" : state,
      reads,
      fingerprint,
      problems: [],
    } as CellStatus;
    this.#cellsOf(studyId).push({
      status,
      source: { ...cell, id: cellId, order: `a${this.#cellsOf(studyId).length}` },
      ...(finding !== undefined && { finding }),
    });
    return { cellId, fingerprint };
  }

  changed(studyId: string): void {
    this.calls.push(`changed ${studyId}`);
  }

  status(studyId: string): StudyStatus {
    return { studyId, cells: this.#cellsOf(studyId).map(({ status }) => status) };
  }

  estimate(studyId: string, cellId: string, userId: string): void {
    this.calls.push(`estimate ${studyId} ${cellId} ${userId}`);
  }

  cancel(studyId: string, cellId: string): void {
    this.calls.push(`cancel ${studyId} ${cellId}`);
  }

  bringUpToDate(studyId: string, userId: string): void {
    this.calls.push(`bring up to date ${studyId} ${userId}`);
  }

  removed(studyId: string): void {
    this.calls.push(`removed ${studyId}`);
  }

  /** A question of a data cell that means nothing, where the study has such a cell. */
  dataOf(studyId: string, cellId: string) {
    const found = this.#cellsOf(studyId).find(({ status }) => status.cellId === cellId);
    if (found?.status.kind !== "data") return undefined;
    const specification = { kind: "data" as const, upload: "weeks.csv", goods: {}, normalise: "mean" as const };
    return { fingerprint: found.status.fingerprint ?? "", specification, uploadId: "weeks" };
  }

  finding(studyId: string, fingerprint: string): StoredFinding | undefined {
    const found = this.#cellsOf(studyId).find(({ status }) => status.fingerprint === fingerprint)?.finding;
    return found === undefined ? undefined : { finding: found, foundAt: new Date(0), tookMs: 12 };
  }

  #cellsOf(studyId: string) {
    const cells = this.#studies.get(studyId) ?? [];
    this.#studies.set(studyId, cells);
    return cells;
  }
}

/** A fake of the sockets: writes down whose are closed, and where. */
export class FakeSockets {
  readonly closed: string[] = [];
  /** Studies whose people were told of other remarks. */
  readonly remarked: string[] = [];
  readonly closePerson = (userId: string, studyId = "everywhere"): void =>
    void this.closed.push(`${userId} ${studyId}`);
  readonly closeSession = (sessionId: string): void => void this.closed.push(`session ${sessionId}`);
  readonly remarksChanged = (studyId: string): void => void this.remarked.push(studyId);
}

/** A fake of the worker: takes every file for one column of numbers, or refuses it when told to. */
export class FakeParser {
  refuse: string | undefined;
  readonly #open: OpenDatabase;

  constructor(open: OpenDatabase) {
    this.#open = open;
  }

  /** What was asked to be looked at. */
  readonly looked: LookJob[] = [];

  readonly look = async (look: LookJob): Promise<RowsPage> => {
    this.looked.push(look);
    return { total: 1, from: 0, columns: [{ name: "p1", type: "number" }], rows: [{ row: 1, cells: [2] }] };
  };

  /** Files are told apart by what is stored of them, as the worker tells them apart. */
  readonly parse = async (uploadId: string, _signal?: AbortSignal, sheet?: string): Promise<ParsedUpload> => {
    if (this.refuse !== undefined) throw new Refusal([{ sentence: this.refuse, row: 3, column: "p1" }]);
    const description = JSON.stringify({ name: "p1", type: "number", missing: 0, distinct: 2 });
    this.#open.db
      .insert(uploadColumns)
      .values({
        uploadId,
        position: 0,
        name: "p1",
        type: "number",
        description,
        levels: null,
        values: Buffer.alloc(16),
      })
      .run();
    const { sqlite } = this.#open;
    const stored = sqlite.prepare("SELECT name, sha256 FROM uploads WHERE id = ?").get(uploadId) as Record<
      string,
      string
    >;
    const sha256 = createHash("sha256").update(`${stored.sha256} ${sheet}`).digest("hex");
    if (stored.name.endsWith(".xlsx")) {
      return { rows: 2, sha256, format: "xlsx", sheet: sheet ?? "Rows", sheets: ["Rows", "Codes"] };
    }
    return { rows: 2, sha256, format: "csv", separator: ",", decimalComma: false };
  };
}
