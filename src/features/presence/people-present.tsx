import { firstName, type Present } from "./present.ts";

interface PeoplePresentProps {
  readonly people: readonly Present[];
  readonly nameOfCell: (cellId: string) => string | undefined;
}

/** Who is here, in words, each underlined in their colour, with where they are. */
export function PeoplePresent({ people, nameOfCell }: PeoplePresentProps) {
  return (
    <ul aria-label="People here" className="flex flex-wrap items-center gap-x-6 gap-y-1">
      {people.map(({ person, colour, isYou, cells }) => {
        const where = cells.map(nameOfCell).filter(Boolean).join(" and ");
        const place = isYou ? "you" : where ? `in ${where}` : person.role === "reader" ? "reading" : "";
        return (
          <li
            key={person.id}
            className="border-b-2 pb-0.5"
            style={{ borderColor: `var(--who-${colour.letter})`, borderStyle: colour.dashed ? "dashed" : "solid" }}
          >
            <span className="font-semibold">
              <span className="wide-only">{person.name}</span>
              <span className="narrow-only">{firstName(person.name)}</span>
            </span>
            {place && <span className={`text-ink2 ${isYou ? "wide-only" : ""}`}> {place}</span>}
          </li>
        );
      })}
    </ul>
  );
}
