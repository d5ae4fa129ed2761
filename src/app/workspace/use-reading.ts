import { useEffect, useState } from "react";
import { afterFirstFinding } from "./first-finding.ts";

type Reading = typeof import("./reading.ts");

let here: Reading | undefined;

/** What reads the cells' texts: YAML, schemas, references. */
export async function loadReading(): Promise<Reading> {
  here = await import("./reading.ts");
  return here;
}

/** The same on a page: at once where something waits to be read, else as soon as the first finding stands. */
export function useReading(isWaitedFor: boolean): Reading | undefined {
  const [reading, setReading] = useState(here);
  const [fault, setFault] = useState<unknown>();
  useEffect(() => {
    if (reading) return;
    let isOpen = true;
    const loaded = isWaitedFor ? loadReading() : afterFirstFinding(loadReading);
    loaded.then(
      (now) => isOpen && setReading(now),
      (error) => isOpen && setFault(error),
    );
    return () => {
      isOpen = false;
    };
  }, [reading, isWaitedFor]);
  // Without it nothing more can be said of the study: the page tells so, and offers to be loaded again.
  if (fault) throw fault;
  return reading;
}
