import { useId, useState } from "react";
import type { Person } from "../../../shared/schemas/resources.ts";
import { Button, Word } from "../../components/button.tsx";
import { Fault } from "../../components/field.tsx";
import { sentenceOf } from "../../lib/api.ts";
import { useHandOver } from "./api/change-people.ts";

interface HandOverProps {
  readonly studyId: string;
  /** Of the study; coauthors can be handed it. */
  readonly people: readonly Person[];
}

/** Gives the study to a coauthor, at once and after a second question. */
export function HandOver({ studyId, people }: HandOverProps) {
  const id = useId();
  const handOver = useHandOver(studyId);
  const coauthors = people.filter(({ role }) => role === "coauthor");
  const [chosen, setChosen] = useState("");
  const [asked, setAsked] = useState(false);
  const heir = coauthors.find((person) => person.id === chosen) ?? coauthors[0];
  if (heir === undefined) return null;
  return (
    <section aria-labelledby={`${id}-head`} className="pt-6">
      <h3 id={`${id}-head`} className="type-section pb-2">
        Hand the study over
      </h3>
      {asked ? (
        <>
          <p className="pb-3">
            {heir.name} owns the study from now on, and you stay as a coauthor. Only {heir.name} can give it back.
          </p>
          <div className="flex flex-wrap items-center gap-4">
            <Button disabled={handOver.isPending} onClick={() => handOver.mutate(heir.id)}>
              Hand over to {heir.name}
            </Button>
            <Word quiet onClick={() => setAsked(false)}>
              Keep it
            </Word>
          </div>
          {handOver.isError && <Fault>{sentenceOf(handOver.error)}</Fault>}
        </>
      ) : (
        <div className="flex flex-wrap items-end gap-4">
          <div className="grow">
            <label htmlFor={id} className="type-small block pb-1 text-ink2">
              To a coauthor
            </label>
            <select id={id} className="field" value={heir.id} onChange={(event) => setChosen(event.target.value)}>
              {coauthors.map((person) => (
                <option key={person.id} value={person.id}>
                  {person.name}
                </option>
              ))}
            </select>
          </div>
          <Button className="min-h-[2.625rem]" onClick={() => setAsked(true)}>
            Hand over
          </Button>
        </div>
      )}
    </section>
  );
}
