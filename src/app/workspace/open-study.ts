import { useOutletContext } from "react-router-dom";
import type { Account, StudySummary } from "../../../shared/schemas/resources.ts";
import type { StudyConnection } from "../../sync/index.ts";

/** A study open on a page: what the server says of it, who looks at it, the live document. */
export interface OpenStudy {
  readonly study: StudySummary;
  readonly me: Account;
  readonly connection: StudyConnection;
  readonly readOnly: boolean;
}

export const useOpenStudy = () => useOutletContext<OpenStudy>();
