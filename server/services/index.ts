import type { Database } from "../db/client.ts";
import { type Access, createAccess } from "./access.ts";
import { type CheckpointService, createCheckpointService } from "./checkpoints.ts";
import { createHistoryService, type HistoryService } from "./history.ts";
import { createJournalService, type JournalService } from "./journal.ts";
import type { MailService } from "./mail.ts";
import { createPeopleService, type PeopleService } from "./people.ts";
import type { Cells, ClosePerson, ParseUpload, SourcesOf } from "./ports.ts";
import { createRefereeCopyService, type RefereeCopyService } from "./referee-copies.ts";
import { createRemarkService, type RemarkService } from "./remarks.ts";
import { createStudyService, type StudyService } from "./studies.ts";
import { createUploadService, type UploadService } from "./uploads.ts";

export interface Services {
  readonly access: Access;
  readonly mail: MailService;
  readonly journal: JournalService;
  readonly cells: Cells;
  readonly studies: StudyService;
  readonly people: PeopleService;
  readonly uploads: UploadService;
  readonly refereeCopies: RefereeCopyService;
  readonly history: HistoryService;
  readonly checkpoints: CheckpointService;
  readonly remarks: RemarkService;
  /** Someone has signed out: their open sockets close. */
  readonly signedOut: (userId: string) => void;
}

interface Collaborators {
  readonly db: Database;
  readonly mail: MailService;
  readonly cells: Cells;
  readonly sourcesOf: SourcesOf;
  readonly closePerson: ClosePerson;
  readonly remarksChanged: (studyId: string) => void;
  readonly parseUpload: ParseUpload;
  readonly program: string;
}

export function createServices({
  db,
  mail,
  cells,
  sourcesOf,
  closePerson,
  remarksChanged,
  parseUpload,
  program,
}: Collaborators): Services {
  const access = createAccess(db);
  const journal = createJournalService({ db, access });
  const { record } = journal;
  return {
    access,
    mail,
    journal,
    cells,
    studies: createStudyService({ db, access, cells, closePerson }),
    people: createPeopleService({ db, access, closePerson }),
    uploads: createUploadService({ db, access, parseUpload, sourcesOf, cells, record }),
    remarks: createRemarkService({ db, access, sourcesOf, remarksChanged }),
    history: createHistoryService({ db, access, sourcesOf }),
    checkpoints: createCheckpointService({ db, access, sourcesOf }),
    refereeCopies: createRefereeCopyService({ db, access, cells, sourcesOf, program, record }),
    signedOut: (userId) => closePerson(userId),
  };
}
