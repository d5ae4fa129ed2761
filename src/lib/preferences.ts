const KEY = "tangency-letter-keys";
const listeners = new Set<() => void>();
let chosen: boolean | undefined;

/** Whether single-letter keys act; they do until turned off on this machine. */
export function letterKeysAct(): boolean {
  try {
    chosen ??= localStorage.getItem(KEY) !== "off";
  } catch {
    chosen ??= true;
  }
  return chosen;
}

export function chooseLetterKeys(act: boolean): void {
  chosen = act;
  try {
    localStorage.setItem(KEY, act ? "on" : "off");
  } catch {
    // Kept for this page only, then.
  }
  for (const listener of listeners) listener();
}

export function onPreferencesChange(listener: () => void): () => void {
  listeners.add(listener);
  return () => listeners.delete(listener);
}
