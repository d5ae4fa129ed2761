import { Word } from "./button.tsx";
import { Fault } from "./field.tsx";

interface UnfetchedProps {
  /** Why, in a sentence. */
  readonly sentence: string;
  readonly onAgain: () => void;
}

/** In the place of what could not be fetched: why, and the way to ask again. */
export function Unfetched({ sentence, onAgain }: UnfetchedProps) {
  return (
    <div className="pb-3">
      <Fault>{sentence}</Fault>
      <Word className="mt-1" onClick={onAgain}>
        Try again
      </Word>
    </div>
  );
}
