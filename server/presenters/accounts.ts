import type { AccountSummary, MailSummary, OwnAccount, SessionSummary } from "../../shared/schemas/accounts.ts";
import type { AccountView } from "../services/administration.ts";
import type { MailView } from "../services/mail.ts";
import type { Holding, OwnAccount as OwnAccountView, SessionRow } from "../services/own-account.ts";
import { browserInWords } from "./browser-in-words.ts";

export function presentOwnAccount(view: OwnAccountView, sessionId: string): OwnAccount {
  const { id, name, email, emailVerified, createdAt } = view.account;
  return {
    id,
    name,
    email,
    isConfirmed: emailVerified,
    since: createdAt.toISOString(),
    sessions: view.sessions.map((session) => presentSession(session, sessionId)),
    toHandOver: view.toHandOver.map(presentHolding),
    alone: view.alone.map(presentHolding),
  };
}

function presentSession({ id, userAgent, ipAddress, createdAt, updatedAt }: SessionRow, own: string): SessionSummary {
  return {
    id,
    browser: browserInWords(userAgent ?? ""),
    ...(ipAddress && { address: ipAddress }),
    since: createdAt.toISOString(),
    lastUsed: updatedAt.toISOString(),
    isThis: id === own,
  };
}

const presentHolding = ({ studyId, title, others }: Holding) => ({ studyId, title, others });

export function presentMail(mail: MailView): MailSummary {
  return {
    id: mail.id,
    to: mail.recipient,
    subject: mail.subject,
    state: mail.state,
    writtenAt: mail.writtenAt.toISOString(),
    attempts: mail.attempts,
    ...(mail.state === "waiting" && mail.nextAt !== null && { nextAt: mail.nextAt.toISOString() }),
    ...(mail.settledAt !== null && { settledAt: mail.settledAt.toISOString() }),
    ...(mail.fault !== null && { fault: mail.fault }),
    ...(mail.text !== undefined && { text: mail.text }),
  };
}

export function presentAccount({ account, studies }: AccountView): AccountSummary {
  const { id, name, email, emailVerified, createdAt } = account;
  return { id, name, email, isConfirmed: emailVerified, since: createdAt.toISOString(), studies };
}
