import { createContext, type MouseEvent, useContext } from "react";

/** A letter that leads to what was said of a place. */
export interface PlaceLetter {
  readonly id: string;
  readonly letter: string;
  /** Read aloud: "Remark a by Tomás Adeyemi, on Symmetry". */
  readonly label: string;
}

interface Anchors {
  readonly at: ReadonlyMap<string, readonly PlaceLetter[]>;
  readonly follow: (id: string) => void;
}

const AnchorContext = createContext<Anchors | undefined>(undefined);

/** The places something is said of, within a provider. */
export const useAnchors = (): Anchors | undefined => useContext(AnchorContext);

/** Within it, places that can be spoken of carry the letters of what is said of them. */
export const AnchorProvider = AnchorContext.Provider;

/** Ids of the two ends of a letter. */
export const saidId = (id: string) => `said-${id}`;
export const letterId = (id: string) => `letter-${id}`;

/**
 * A place that can be spoken of, by a name people read: "verdict Symmetry", "row Log size", "entry Grains, Dairy".
 * Nothing is drawn until something is said of it; outside a study nothing at all.
 */
export function AnchorMark({ of }: { of: string }) {
  const anchors = useAnchors();
  if (anchors === undefined) return null;
  return (
    <span data-anchor={of} className="anchor-mark no-print">
      {anchors.at.get(of)?.map(({ id, letter, label }) => (
        <a
          key={id}
          id={letterId(id)}
          href={`#${saidId(id)}`}
          aria-label={label}
          className="anchor-letter"
          onClick={(event: MouseEvent) => {
            event.preventDefault();
            anchors.follow(id);
          }}
        >
          {letter}
        </a>
      ))}
    </span>
  );
}
