import type { Role } from "../../shared/schemas/resources.ts";

/**
 * Who may do what in a study: one table for HTTP and socket alike. What a role is not named for, it
 * may not do; someone who is no member may do nothing and is not told that the study exists.
 */
const ALLOWED = {
  "study.read": ["owner", "coauthor", "reader"],
  "study.change": ["owner", "coauthor"],
  "study.delete": ["owner"],
  "study.bring back": ["owner"],
  "study.purge": ["owner"],
  "study.put away": ["owner", "coauthor", "reader"],
  "document.read": ["owner", "coauthor", "reader"],
  "document.write": ["owner", "coauthor"],
  "history.read": ["owner", "coauthor", "reader"],
  "checkpoint.read": ["owner", "coauthor", "reader"],
  "checkpoint.make": ["owner", "coauthor"],
  "checkpoint.change": ["owner", "coauthor"],
  "checkpoint.return": ["owner", "coauthor"],
  "checkpoint.remove": ["owner"],
  "people.read": ["owner", "coauthor", "reader"],
  "people.invite": ["owner"],
  "people.change": ["owner"],
  "people.remove": ["owner"],
  "people.hand over": ["owner"],
  "journal.read": ["owner", "coauthor", "reader"],
  "journal.read all": ["owner"],
  "upload.read": ["owner", "coauthor", "reader"],
  "upload.add": ["owner", "coauthor"],
  "upload.remove": ["owner", "coauthor"],
  "finding.read": ["owner", "coauthor", "reader"],
  "estimation.start": ["owner", "coauthor"],
  "estimation.cancel": ["owner", "coauthor"],
  "remark.read": ["owner", "coauthor", "reader"],
  "remark.write": ["owner", "coauthor", "reader"],
  "remark.edit": [],
  "remark.settle": ["owner", "coauthor"],
  "remark.withdraw": ["owner"],
  "referee copy.read": ["owner"],
  "referee copy.seal": ["owner"],
  "referee copy.change": ["owner"],
  "referee copy.revoke": ["owner"],
  "replication bundle.make": ["owner"],
} as const satisfies Record<string, readonly Role[]>;

/** What anyone of the study may do besides with what they made themselves. */
const ALLOWED_WITH_OWN: readonly string[] = ["remark.edit", "remark.settle", "remark.withdraw"] satisfies Action[];

export type Action = keyof typeof ALLOWED;

export const ACTIONS = Object.keys(ALLOWED) as Action[];

export interface Actor {
  readonly id: string;
}

/**
 * What whoever administers the installation may do, and nobody else. It opens no study: an administrator who is in
 * none reads none.
 */
const ADMINISTRATION = ["mail.read", "mail.try again", "account.read", "installation journal.read"] as const;

export type AdministrationAction = (typeof ADMINISTRATION)[number];

export interface Standing {
  readonly isAdministrator: boolean;
}

export function canAdminister(standing: Standing | undefined, action: AdministrationAction): boolean {
  return standing?.isAdministrator === true && ADMINISTRATION.includes(action);
}

/** As much of a study as a decision needs: who is in it, as what. */
export interface Membership {
  roleOf(userId: string): Role | undefined;
}

/** `madeBy`: the account whose thing it is, where what one made oneself counts. */
export function can(actor: Actor | undefined, action: Action, study: Membership, madeBy?: string): boolean {
  const role = actor === undefined ? undefined : study.roleOf(actor.id);
  if (role === undefined) return false;
  return rolesThatMay(action).includes(role) || (ALLOWED_WITH_OWN.includes(action) && madeBy === actor?.id);
}

export function rolesThatMay(action: Action): readonly Role[] {
  return ALLOWED[action];
}
