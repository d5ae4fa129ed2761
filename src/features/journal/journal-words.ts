import type { JournalAction, JournalEntry } from "../../../shared/schemas/journal.ts";

/** What was done, to read on from who did it; … stands where the subject comes. */
const WORDS: Readonly<Record<JournalAction, string>> = {
  "study made": "made the study",
  "study deleted": "deleted the study",
  "study brought back": "brought the study back",
  "ownership handed over": "handed the study over to …",
  "person invited": "invited …",
  "invitation sent again": "sent the invitation of … again",
  "invitation withdrawn": "withdrew the invitation of …",
  "invitation refused": "refused the invitation sent to …",
  "person joined": "joined …",
  "role changed": "changed the role of …",
  "person removed": "removed …",
  "person left": "left",
  "upload added": "uploaded …",
  "upload removed": "removed the upload …",
  "referee copy sealed": "sealed a referee copy of …",
  "replication bundle made": "made a replication bundle: …",
  "referee copy sent": "sent a referee copy to …",
  "referee copy replaced": "replaced the referee copy of …",
  "referee copy revoked": "revoked the referee copy of …",
  "checkpoint kept": "kept the checkpoint …",
  "checkpoint returned to": "returned to the checkpoint …",
  "checkpoint removed": "removed the checkpoint …",
  "account made": "made an account",
  "account deleted": "An account was deleted",
  "address changed": "changed the address of their account",
  "passphrase reset": "set a new passphrase by a link",
  "sign-in locked": "Sign-in was locked for a quarter of an hour: too many wrong passphrases for …",
  "study deleted for good": "A study was deleted for good",
};

/** "Ilse Marchetti invited petra.vance@vihe.example, as reader." */
export function entryInWords({ by, action, subject = "" }: JournalEntry): string {
  const words = WORDS[action].replace("…", subject).replace(/ +/g, " ").trim();
  if (/^\p{Lu}/u.test(words)) return by === undefined ? `${words}.` : `${words}, by ${by}.`;
  return `${by ?? "Whoever had the link"} ${words}.`;
}
