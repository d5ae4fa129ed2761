import { AnchorMark, useAnchors } from "../../components/anchor-mark.tsx";
import { anchorInWords } from "./letters.ts";

/** Below a source: letters of what is said of its keys. */
export function KeyMarks() {
  const anchors = useAnchors();
  const keys = [...(anchors?.at.keys() ?? [])].filter((anchor) => anchor.startsWith("key "));
  if (keys.length === 0) return null;
  return (
    <p className="type-small pt-3 text-ink2 no-print">
      Remarks:{" "}
      {keys.map((anchor, place) => (
        <span key={anchor}>
          {place > 0 && ", "}
          on {anchorInWords(anchor)}
          <AnchorMark of={anchor} />
        </span>
      ))}
    </p>
  );
}
