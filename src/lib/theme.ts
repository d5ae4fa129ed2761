/** What a person chose; "system" follows the machine. */
export type ThemeChoice = "system" | "light" | "dark";

/** The key public/theme.js reads before the first paint. */
const KEY = "tangency-theme";
const listeners = new Set<() => void>();
const prefersDark = () => (typeof matchMedia === "function" ? matchMedia("(prefers-color-scheme: dark)") : undefined);

export function themeChoice(): ThemeChoice {
  try {
    const kept = localStorage.getItem(KEY);
    return kept === "light" || kept === "dark" ? kept : "system";
  } catch {
    return "system";
  }
}

export function chooseTheme(choice: ThemeChoice): void {
  try {
    if (choice === "system") localStorage.removeItem(KEY);
    else localStorage.setItem(KEY, choice);
  } catch {
    // Kept for this page only, then.
  }
  applyTheme(choice);
}

function applyTheme(choice: ThemeChoice): void {
  const dark = choice === "system" ? (prefersDark()?.matches ?? false) : choice === "dark";
  document.documentElement.dataset.theme = dark ? "dark" : "light";
  for (const listener of listeners) listener();
}

/** Follows the system, and other windows in which a choice is made. */
export function followTheme(): () => void {
  const again = () => applyTheme(themeChoice());
  const fromElsewhere = (event: StorageEvent) => event.key === KEY && again();
  prefersDark()?.addEventListener("change", again);
  addEventListener("storage", fromElsewhere);
  again();
  return () => {
    prefersDark()?.removeEventListener("change", again);
    removeEventListener("storage", fromElsewhere);
  };
}

export function onThemeChange(listener: () => void): () => void {
  listeners.add(listener);
  return () => listeners.delete(listener);
}
