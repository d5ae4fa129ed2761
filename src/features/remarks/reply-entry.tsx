import { useState } from "react";
import type { RemarkReply } from "../../../shared/schemas/remarks.ts";
import { useReword } from "./api/change-remarks.ts";
import { AuthorLine } from "./author-line.tsx";
import { OwnWords } from "./own-words.tsx";
import { RemarkForm } from "./remark-form.tsx";
import type { RemarkSetting } from "./remark-setting.ts";
import { RemarkText } from "./remark-text.tsx";
import { WithdrawWords } from "./withdraw-words.tsx";

interface ReplyEntryProps {
  readonly setting: RemarkSetting;
  readonly remarkId: string;
  readonly reply: RemarkReply;
  readonly full?: boolean;
}

/** A reply, set in below its remark. */
export function ReplyEntry({ setting, remarkId, reply, full }: ReplyEntryProps) {
  const [isEditing, setEditing] = useState(false);
  const reword = useReword(setting.studyId, remarkId, reply.id);
  const { author, may } = reply;
  const where = { studyId: setting.studyId, remarkId, replyId: reply.id, of: `the reply by ${author.name}` };
  return (
    <li className="remark-reply">
      <AuthorLine
        {...reply}
        colour={setting.colourOf(author.id)}
        full={full}
        after={!isEditing && <OwnWords {...where} may={may} onEdit={() => setEditing(true)} />}
      />
      {isEditing ? (
        <RemarkForm
          setting={setting}
          label="Your reply"
          of={`edit/${reply.id}`}
          before={reply.text}
          word="Keep the change"
          beside={<WithdrawWords {...where} />}
          send={({ text }) => reword.mutateAsync(text)}
          onDone={() => setEditing(false)}
        />
      ) : (
        <RemarkText key={reply.text} text={reply.text} />
      )}
    </li>
  );
}
