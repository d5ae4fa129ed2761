import type { ReactNode } from "react";
import type { RemarkReply } from "../../../shared/schemas/remarks.ts";
import { fullMoment, whenInWords } from "../../lib/dates.ts";
import type { PersonColour } from "../../sync/index.ts";

interface AuthorLineProps {
  readonly author: RemarkReply["author"];
  readonly colour: PersonColour | undefined;
  readonly writtenAt: string;
  readonly editedAt?: string;
  readonly full?: boolean;
  /** The letter, before the name. */
  readonly children?: ReactNode;
  readonly after?: ReactNode;
}

/** Who, underlined in their colour while they are here, and when. */
export function AuthorLine({ author, colour, writtenAt, editedAt, full = false, children, after }: AuthorLineProps) {
  const first = author.name.trim().split(/\s+/)[0] ?? author.name;
  return (
    <div className="remark-author">
      {children}
      <b
        className="remark-name"
        title={author.name}
        style={{
          borderBottomColor: colour ? `var(--who-${colour.letter})` : "var(--rule2)",
          borderBottomStyle: colour?.dashed ? "dashed" : "solid",
        }}
      >
        {full || author.name.startsWith("someone") ? author.name : first}
      </b>{" "}
      <time dateTime={writtenAt} title={fullMoment(writtenAt)} className="text-ink2">
        {whenInWords(writtenAt)}
      </time>
      {editedAt && (
        <span className="text-ink3" title={fullMoment(editedAt)}>
          , edited {whenInWords(editedAt)}
        </span>
      )}
      {after && <span className="remark-after">{after}</span>}
    </div>
  );
}
