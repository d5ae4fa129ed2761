import { randomUUID } from "node:crypto";
import type { CellSource } from "../../shared/study/cell-source.ts";
import type { Database } from "../db/client.ts";
import { insertRemark, insertReply } from "../db/queries/remarks.ts";

type Person = "Ilse" | "Tomás" | "Petra";
const PEOPLE: readonly Person[] = ["Ilse", "Tomás", "Petra"];

interface DemoRemark {
  readonly cell: string;
  readonly anchor?: string;
  readonly by: Person;
  readonly hoursAgo: number;
  readonly text: string;
  readonly replies?: readonly { readonly by: Person; readonly hoursAgo: number; readonly text: string }[];
}

/** What the people of the invented study said of its cells while they worked on it. */
const REMARKS: readonly DemoRemark[] = [
  {
    cell: "base",
    anchor: "verdict Symmetry",
    by: "Tomás",
    hoursAgo: 50,
    text: "We impose this. Quote the test beside it, and the small-sample correction too.",
    replies: [{ by: "Ilse", hoursAgo: 49, text: "Agreed. laws has both; they go into the note." }],
  },
  {
    cell: "ninetieth",
    by: "Ilse",
    hoursAgo: 26,
    text: "The referees will ask about the top. Keep this one beside matrix, at the base point.",
  },
  {
    cell: "fifths",
    by: "Petra",
    hoursAgo: 3,
    text: "Is the lowest fifth by expenditure of the household, or a head? The ministry counts heads.",
  },
];

/** Writes the demo's remarks under the cells of those names. `ids`: the accounts, in the order of `DEMO_PEOPLE`. */
export function seedDemoRemarks(
  db: Database,
  studyId: string,
  cells: readonly Pick<CellSource, "id" | "name">[],
  ids: readonly string[],
): void {
  const before = (hours: number) => new Date(Date.now() - hours * 3_600_000);
  const idOf = (person: Person) => ids[PEOPLE.indexOf(person)];
  for (const { cell: name, anchor, by, hoursAgo, text, replies = [] } of REMARKS) {
    const cell = cells.find((one) => one.name === name);
    if (cell === undefined) continue;
    const id = randomUUID();
    insertRemark(db, {
      id,
      studyId,
      cellId: cell.id,
      cellName: name,
      anchor: anchor ?? null,
      authorId: idOf(by),
      text,
      writtenAt: before(hoursAgo),
    });
    for (const reply of replies) {
      insertReply(db, {
        id: randomUUID(),
        remarkId: id,
        authorId: idOf(reply.by),
        text: reply.text,
        writtenAt: before(reply.hoursAgo),
      });
    }
  }
}
