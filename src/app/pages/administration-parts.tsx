import { AccountTable } from "../../features/administration/account-table.tsx";
import { MailList } from "../../features/administration/mail-list.tsx";
import { JournalList } from "../../features/journal/journal-list.tsx";

export const Messages = () => <MailList />;
export const Accounts = () => <AccountTable />;
export const InstallationJournal = () => <JournalList />;
