import { type RefObject, useLayoutEffect, useState } from "react";

export interface Places {
  readonly width: number;
  readonly height: number;
  /** Where each cell's name stands, from the top of the ledger. */
  readonly y: ReadonlyMap<string, number>;
}

const NOWHERE: Places = { width: 0, height: 0, y: new Map() };

/** Where the names of the bands stand, measured anew when anything on the page changes its size. */
export function usePlaces(ledger: RefObject<HTMLElement | null>, ids: readonly string[]): Places {
  const [places, setPlaces] = useState(NOWHERE);
  const key = ids.join(" ");
  useLayoutEffect(() => {
    const root = ledger.current;
    if (!root || typeof ResizeObserver === "undefined") return;
    const measure = () => setPlaces((before) => same(before, measured(root)));
    const observer = new ResizeObserver(measure);
    observer.observe(root);
    for (const band of root.querySelectorAll(key ? ".verso, .recto" : ".verso")) observer.observe(band);
    measure();
    return () => observer.disconnect();
  }, [ledger, key]);
  return places;
}

function measured(root: HTMLElement): Places {
  const top = root.getBoundingClientRect();
  const verso = root.querySelector(".band > .verso")?.getBoundingClientRect();
  const y = new Map<string, number>();
  for (const band of root.querySelectorAll("section.band")) {
    const name = band.querySelector("[data-stop]")?.getBoundingClientRect();
    // Half a line of the name's type, so that a name of two lines has its dot at the first.
    if (name) y.set(band.id.replace(/^cell-/, ""), Math.round(name.top - top.top + 14));
  }
  return { width: verso ? Math.round(verso.left - top.left) : 0, height: Math.round(top.height), y };
}

function same(before: Places, now: Places): Places {
  const isSame =
    before.width === now.width &&
    before.height === now.height &&
    before.y.size === now.y.size &&
    [...now.y].every(([id, y]) => before.y.get(id) === y);
  return isSame ? before : now;
}
