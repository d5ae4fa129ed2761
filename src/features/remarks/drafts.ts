import { useState } from "react";

export interface Draft {
  readonly text: string;
  readonly anchor?: string;
}

const PREFIX = "tangency-remark";

/** What has been written and not sent, in this window: closing a field, or the page, loses no words. */
export function useDraft(accountId: string, of: string, otherwise: Draft) {
  const key = `${PREFIX}/${accountId}/${of}`;
  const [draft, setDraft] = useState<Draft>(() => read(key) ?? otherwise);
  return {
    draft,
    write(next: Draft): void {
      setDraft(next);
      // What says nothing new is no draft.
      if (next.text.trim() === otherwise.text.trim()) remove(key);
      else keep(key, next);
    },
    forget(): void {
      setDraft(otherwise);
      remove(key);
    },
  };
}

export function hasDraft(accountId: string, of: string): boolean {
  return read(`${PREFIX}/${accountId}/${of}`) !== undefined;
}

/** On signing out: what this account has not sent is forgotten in this window. */
export function forgetDrafts(accountId: string): void {
  for (const key of Object.keys(sessionStorage)) if (key.startsWith(`${PREFIX}/${accountId}/`)) remove(key);
}

function read(key: string): Draft | undefined {
  try {
    const kept: unknown = JSON.parse(sessionStorage.getItem(key) ?? "null");
    if (typeof kept !== "object" || kept === null || !("text" in kept) || typeof kept.text !== "string") return;
    const anchor = "anchor" in kept && typeof kept.anchor === "string" ? kept.anchor : undefined;
    return { text: kept.text, ...(anchor !== undefined && { anchor }) };
  } catch {
    return undefined;
  }
}

function keep(key: string, draft: Draft): void {
  try {
    sessionStorage.setItem(key, JSON.stringify(draft));
  } catch {
    // Kept by the open field only, then.
  }
}

function remove(key: string): void {
  try {
    sessionStorage.removeItem(key);
  } catch {
    // Nothing was kept.
  }
}
