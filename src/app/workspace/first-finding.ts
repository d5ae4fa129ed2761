/** A finding is what a study is opened for: what can wait is loaded once the first can be read, or a person does something. */
let tell: () => void;
const shown = new Promise<void>((resolve) => {
  tell = resolve;
});

export const firstFindingShown = (): void => tell();

export const afterFirstFinding = <T>(load: () => Promise<T>): Promise<T> => shown.then(load);

if (typeof document !== "undefined") {
  for (const type of ["pointerdown", "keydown"]) {
    document.addEventListener(type, firstFindingShown, { once: true, capture: true });
  }
}

const seen = new Set<string>();

/** Whether a finding has been on the page before: one that was is there at once, and does not arrive again. */
export const hasBeenSeen = (fingerprint: string): boolean => seen.has(fingerprint);
export const nowSeen = (fingerprint: string): void => void seen.add(fingerprint);
