/** Puts the focus on one end of a letter, and that end into view. */
export function goTo(id: string): void {
  const end = document.getElementById(id);
  end?.focus({ preventScroll: true });
  end?.scrollIntoView?.({ block: "nearest" });
}
