import { type RefObject, useLayoutEffect, useState } from "react";
import type { Remark } from "../../../shared/schemas/remarks.ts";

interface Levels {
  /** Ids of remarks from the top of the page down. */
  readonly order: readonly string[];
  /** Anchors that are on the page. */
  readonly present: ReadonlySet<string>;
}

const NOTHING: Levels = { order: [], present: new Set() };
/** Pixels between two remarks. */
const GAP = 14;
/** A letter of the strip, and the space below it. */
const LETTER = 28;

/**
 * Sets remarks level with what they speak of, as far as those above them leave room: `--down` is the space above each,
 * `--at` where its letter stands. Measured anew when anything of the band changes its size.
 */
export function useLevels(margin: RefObject<HTMLElement | null>, remarks: readonly Remark[]): Levels {
  const [levels, setLevels] = useState(NOTHING);
  useLayoutEffect(() => {
    const aside = margin.current;
    const band = aside?.parentElement;
    if (!aside || !band || typeof ResizeObserver === "undefined") return;
    const measure = () => setLevels((before) => same(before, measured(band, aside, remarks)));
    const observer = new ResizeObserver(measure);
    for (const page of band.querySelectorAll(":scope > .verso, :scope > .recto")) observer.observe(page);
    for (const one of aside.querySelectorAll(".remark")) observer.observe(one);
    measure();
    return () => observer.disconnect();
  }, [margin, remarks]);
  return levels;
}

function measured(band: HTMLElement, aside: HTMLElement, remarks: readonly Remark[]): Levels {
  const top = band.getBoundingClientRect().top;
  const present = new Set<string>();
  const start = Number.parseFloat(getComputedStyle(aside).getPropertyValue("--first")) || 20;
  const placed = remarks.map(({ id, anchor }) => {
    const mark = anchor && band.querySelector(`[data-anchor="${CSS.escape(anchor)}"]`);
    if (!anchor || !mark) return { id, at: start };
    present.add(anchor);
    return { id, at: Math.max(start, Math.round(mark.getBoundingClientRect().top - top)) };
  });
  placed.sort((a, b) => a.at - b.at);
  place(aside, placed, start);
  return { order: placed.map(({ id }) => id), present };
}

function place(aside: HTMLElement, placed: readonly { id: string; at: number }[], start: number): void {
  let free = start;
  let letter = start;
  for (const { id, at } of placed) {
    const entry = aside.querySelector<HTMLElement>(`.remarks-open > [data-remark="${id}"]`);
    const down = Math.max(0, at - free);
    entry?.style.setProperty("--down", `${down}px`);
    free += down + (entry?.offsetHeight ?? 0) + GAP;
    letter = Math.max(letter, at);
    aside.querySelector<HTMLElement>(`[data-letter="${id}"]`)?.style.setProperty("--at", `${letter}px`);
    letter += LETTER;
  }
}

function same(before: Levels, now: Levels): Levels {
  const isSame =
    before.order.join() === now.order.join() &&
    before.present.size === now.present.size &&
    [...now.present].every((anchor) => before.present.has(anchor));
  return isSame ? before : now;
}
