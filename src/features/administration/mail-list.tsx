import type { MailSummary } from "../../../shared/schemas/accounts.ts";
import { Word } from "../../components/button.tsx";
import { Fault } from "../../components/field.tsx";
import { sentenceOf } from "../../lib/api.ts";
import { momentInWords } from "../../lib/dates.ts";
import { usePostBox, useTryAgain } from "./api/administration.ts";
import { LetterText } from "./letter-text.tsx";

/** Every message of the installation; what the local post box keeps can be read. */
export function MailList() {
  const { data, error } = usePostBox();
  if (error && !data) return <Fault>{sentenceOf(error)}</Fault>;
  if (!data) return <p role="status">Fetching the messages</p>;
  return (
    <>
      <p className="type-finding max-w-[40rem] pb-6">
        {data.kind === "post box"
          ? "No mail server is set. Nothing leaves the installation: this local post box stands in for a mail service and keeps each message for 30 days."
          : "Messages leave by the mail server. Their words are not kept once it has taken them."}
      </p>
      {data.mails.length === 0 ? (
        <p>No message yet.</p>
      ) : (
        <ul className="border-line border-b">
          {data.mails.map((mail) => (
            <MailEntry key={mail.id} mail={mail} />
          ))}
        </ul>
      )}
    </>
  );
}

function MailEntry({ mail }: { mail: MailSummary }) {
  const again = useTryAgain();
  return (
    <li className="border-line border-t py-3.5">
      <div className="flex flex-wrap items-baseline justify-between gap-x-8">
        <h2 className="type-section min-w-0 break-words">{mail.subject}</h2>
        <p className="type-small text-ink2">{momentInWords(mail.writtenAt)}</p>
      </div>
      <p className="type-small break-words text-ink2">
        To {mail.to}. {standing(mail)}{" "}
        {mail.state === "waiting" && mail.attempts > 0 && (
          <Word disabled={again.isPending} onClick={() => again.mutate(mail.id)}>
            Try now
          </Word>
        )}
      </p>
      {mail.fault && <Fault>{mail.fault}</Fault>}
      {mail.text !== undefined && (
        <details className="pt-1.5">
          <summary className="cursor-pointer">
            Read it<span className="sr-only">: {mail.subject}</span>
          </summary>
          <LetterText text={mail.text} />
        </details>
      )}
    </li>
  );
}

function standing({ state, attempts, nextAt }: MailSummary): string {
  if (state === "sent") return "Sent.";
  if (state === "kept") return "Kept here.";
  if (state === "given up") return `Given up after ${attempts === 1 ? "one attempt" : `${attempts} attempts`}.`;
  return attempts === 0 || nextAt === undefined
    ? "On its way."
    : `Not taken yet; tried again ${momentInWords(nextAt)}.`;
}
