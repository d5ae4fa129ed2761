import { useState } from "react";
import { Word } from "../../components/button.tsx";
import { partsOf } from "./links.ts";

/** Longer ones show their beginning until asked. */
const SHOWN = 600;

function beginningOf(text: string): string {
  const cut = text.slice(0, SHOWN);
  return cut.slice(0, Math.max(cut.lastIndexOf(" "), cut.lastIndexOf("\n"), SHOWN / 2));
}

/** A remark's words: plain text, its line breaks kept, web addresses as links. */
export function RemarkText({ text }: { text: string }) {
  const [whole, setWhole] = useState(text.length <= SHOWN * 1.25);
  return (
    <p className="remark-text">
      {partsOf(whole ? text : `${beginningOf(text)} …`).map((part, place) =>
        part.address === undefined ? (
          part.text
        ) : (
          <a key={place} href={part.address} target="_blank" rel="noopener nofollow" className="word">
            {part.text}
          </a>
        ),
      )}
      {!whole && (
        <>
          {" "}
          <Word className="type-small" onClick={() => setWhole(true)}>
            All of it
          </Word>
        </>
      )}
    </p>
  );
}
