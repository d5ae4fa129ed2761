import { useEffect, useState, useSyncExternalStore } from "react";
import type { Account, Role } from "../../shared/schemas/resources.ts";
import type { StudySnapshot } from "./snapshot.ts";
import { openStudy, type StudyConnection } from "./study.ts";

/** Opens the study while the component is there; undefined for the first moment. */
export function useStudyConnection(
  studyId: string,
  account: Pick<Account, "id">,
  role: Role,
): StudyConnection | undefined {
  const [study, setStudy] = useState<StudyConnection>();
  const accountId = account.id;
  useEffect(() => {
    const opened = openStudy(studyId, { id: accountId }, role);
    setStudy(opened);
    return () => {
      setStudy(undefined);
      void opened.close();
    };
  }, [studyId, accountId, role]);
  return study;
}

/** A part of the snapshot; the component is drawn anew only when that part changes. */
export function useStudyPart<K extends keyof StudySnapshot>(study: StudyConnection, part: K): StudySnapshot[K] {
  return useSyncExternalStore(study.subscribe, () => study.snapshot()[part]);
}
