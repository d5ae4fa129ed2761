import { type Present, typingInWords } from "../../features/presence/present.ts";

/** Who is typing in a cell, in their colour. */
export function TypingHere({ people, className = "" }: { people: readonly Present[]; className?: string }) {
  if (people.length === 0) return null;
  return (
    <span
      className={`type-small font-semibold ${className}`}
      style={{ color: `var(--who-${people[0].colour.letter})` }}
    >
      {typingInWords(people.map(({ person }) => person))}
    </span>
  );
}
