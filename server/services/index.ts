import type { Database } from "../db/client.ts";
import { type Access, createAccess } from "./access.ts";
import type { AccountEvents } from "./account-events.ts";
import { type AccountService, createAccountService } from "./accounts.ts";
import { type AdministrationService, createAdministrationService } from "./administration.ts";
import type { Authentication } from "./authentication.ts";
import { type CheckpointService, createCheckpointService } from "./checkpoints.ts";
import { createHistoryService, type HistoryService } from "./history.ts";
import { createInvitationService, type InvitationService } from "./invitations.ts";
import type { JournalService } from "./journal.ts";
import type { MailService } from "./mail.ts";
import { createOwnAccountService, type OwnAccountService } from "./own-account.ts";
import { createPeopleService, type PeopleService } from "./people.ts";
import type { Cells, ClosePerson, LookAtRows, ParseUpload, SourcesOf, WriteBundle } from "./ports.ts";
import { createRefereeCopyService, type RefereeCopyService } from "./referee-copies.ts";
import { createRemarkService, type RemarkService } from "./remarks.ts";
import { createReplicationBundleService, type ReplicationBundleService } from "./replication-bundles.ts";
import { createStudyService, type StudyService } from "./studies.ts";
import { createUploadService, type UploadService } from "./uploads.ts";

export interface Services {
  readonly access: Access;
  readonly mail: MailService;
  readonly journal: JournalService;
  readonly accounts: AccountService;
  readonly accountEvents: AccountEvents;
  readonly ownAccount: OwnAccountService;
  readonly invitations: InvitationService;
  readonly administration: AdministrationService;
  readonly cells: Cells;
  readonly studies: StudyService;
  readonly people: PeopleService;
  readonly uploads: UploadService;
  readonly refereeCopies: RefereeCopyService;
  readonly replicationBundles: ReplicationBundleService;
  readonly history: HistoryService;
  readonly checkpoints: CheckpointService;
  readonly remarks: RemarkService;
}

interface Collaborators {
  readonly db: Database;
  readonly auth: Authentication;
  readonly accountEvents: AccountEvents;
  readonly mail: MailService;
  readonly journal: JournalService;
  /** Where the pages are, without a slash at its end. */
  readonly url: string;
  /** Addresses of those who administer the installation. */
  readonly administrators: () => readonly string[];
  readonly cells: Cells;
  readonly sourcesOf: SourcesOf;
  readonly closePerson: ClosePerson;
  readonly remarksChanged: (studyId: string) => void;
  readonly parseUpload: ParseUpload;
  readonly lookAtRows: LookAtRows;
  readonly writeBundle: WriteBundle;
  readonly program: string;
}

export function createServices({
  db,
  auth,
  accountEvents,
  mail,
  journal,
  url,
  administrators,
  cells,
  sourcesOf,
  closePerson,
  remarksChanged,
  parseUpload,
  lookAtRows,
  writeBundle,
  program,
}: Collaborators): Services {
  const access = createAccess(db);
  const { record } = journal;
  const studies = createStudyService({ db, access, cells, closePerson, record });
  const accounts = createAccountService({ db, auth, mail, record, url });
  return {
    access,
    mail,
    journal,
    accounts,
    accountEvents,
    ownAccount: createOwnAccountService({ db, auth, record, purgeStudy: studies.purge }),
    invitations: createInvitationService({ db, access, accounts, mail, record, url }),
    administration: createAdministrationService({ db, mail, journal, administrators }),
    cells,
    studies,
    people: createPeopleService({ db, access, closePerson, mail, record, url }),
    uploads: createUploadService({ db, access, parseUpload, lookAtRows, sourcesOf, cells, record }),
    remarks: createRemarkService({ db, access, sourcesOf, remarksChanged }),
    history: createHistoryService({ db, access, sourcesOf }),
    checkpoints: createCheckpointService({ db, access, sourcesOf, record }),
    replicationBundles: createReplicationBundleService({ db, access, cells, sourcesOf, writeBundle, record, program }),
    refereeCopies: createRefereeCopyService({ db, access, cells, sourcesOf, program, record, mail, url }),
  };
}
