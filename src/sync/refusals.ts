import { CLOSE } from "../../shared/schemas/sync.ts";

const SENTENCES: Record<number, string> = {
  [CLOSE.malformed]:
    "The server could not read what this page sent. Load the page again; your edits are kept in this browser.",
  [CLOSE.notSignedIn]: "You are signed out. Sign in again to go on; your edits are kept in this browser.",
  [CLOSE.noRight]: "You are no longer in this study.",
  [CLOSE.noStudy]: "There is no such study, or it is not one of yours.",
  [CLOSE.tooLarge]:
    "This change is larger than the server takes. It is kept in this browser; shorten it and load the page again.",
  [CLOSE.overHardCap]:
    "This change is larger than the server takes. It is kept in this browser; shorten it and load the page again.",
  [CLOSE.tooMany]:
    "This study is open in too many places at once, or was sent too much at once. Close some and load this page again.",
};

/** After these the page stops asking. */
export function isRefusal(code: number): boolean {
  return (code >= 4400 && code < 4500) || code === CLOSE.overHardCap;
}

export function sentenceFor(code: number): string {
  return SENTENCES[code] ?? "The server has closed this study to this page.";
}
