import { useMemo } from "react";
import { colourOf, type PersonColour, type StudyConnection, useStudyPart } from "../../sync/index.ts";

/** What every part of a list of remarks needs to know: whose page it is, of which study, and whether it can be sent. */
export interface RemarkSetting {
  readonly studyId: string;
  readonly me: { readonly id: string };
  /** Without a connection nothing is sent. */
  readonly isAlone: boolean;
  /** The colour of someone who is here; others have none. */
  readonly colourOf: (authorId: string) => PersonColour | undefined;
}

export function useRemarkSetting(studyId: string, me: { readonly id: string }, connection: StudyConnection) {
  const people = useStudyPart(connection, "people");
  const you = useStudyPart(connection, "you");
  const { state } = useStudyPart(connection, "connection");
  const isAlone = state === "working alone" || state === "refused";
  return useMemo((): RemarkSetting => {
    const colours = new Map(people.map((person) => [person.id, colourOf(person, you)]));
    return {
      studyId,
      me,
      isAlone,
      colourOf: (id) => (id === me.id ? { letter: "a", dashed: false } : colours.get(id)),
    };
  }, [studyId, me, isAlone, people, you]);
}
