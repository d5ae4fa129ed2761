import { useId, useState } from "react";
import type { RefereeCopySummary } from "../../../shared/schemas/referee-copies.ts";
import { Button, Word } from "../../components/button.tsx";
import { Fault, Field } from "../../components/field.tsx";
import { sentenceOf } from "../../lib/api.ts";
import { whenInWords } from "../../lib/dates.ts";
import { useMoveEnd, useNewLink } from "./api/change-referee-copy.ts";
import { useRevokeRefereeCopy } from "./api/revoke-referee-copy.ts";
import { fateOf, whatIsSealed } from "./copy-words.ts";
import { LINK_ENDS } from "./link-end.ts";
import type { Told } from "./sealed-link.tsx";

const inFours = (fingerprint: string) => (fingerprint.slice(0, 16).match(/.{4}/g) ?? []).join(" ");

interface CopyEntryProps {
  readonly studyId: string;
  readonly copy: RefereeCopySummary;
  readonly copies: readonly RefereeCopySummary[];
  readonly onTold: (told: Told) => void;
}

/** One copy: what it holds, what has become of it, and what may still be done with its link. */
export function CopyEntry({ studyId, copy, copies, onTold }: CopyEntryProps) {
  const [open, setOpen] = useState<"end" | "link">();
  const revoke = useRevokeRefereeCopy(studyId);
  const id = useId();
  const toggle = (which: "end" | "link") => setOpen(open === which ? undefined : which);
  const of = <span className="sr-only">of the copy of {copy.cellName}</span>;
  return (
    <li className="border-rule border-t py-2.5 last:border-b">
      <p>
        <b>{whatIsSealed(copy)}</b>, sealed {whenInWords(copy.sealedAt)} by {copy.sealedBy}; {fateOf(copy, copies)}
      </p>
      {copy.note && <p className="text-ink2">{copy.note}</p>}
      <p className="type-source text-ink3">{inFours(copy.fingerprint)}</p>
      {!copy.revokedAt && (
        <p className="flex flex-wrap gap-x-5 pt-1">
          <Word aria-expanded={open === "end"} aria-controls={id} onClick={() => toggle("end")}>
            Move the end {of}
          </Word>
          <Word aria-expanded={open === "link"} aria-controls={id} onClick={() => toggle("link")}>
            New link {of}
          </Word>
          <Word disabled={revoke.isPending} onClick={() => revoke.mutate(copy.id)}>
            Revoke <span className="sr-only">the copy of {copy.cellName}</span>
          </Word>
        </p>
      )}
      <div id={id}>
        {open === "end" && <MoveEnd studyId={studyId} copyId={copy.id} onMoved={() => setOpen(undefined)} />}
        {open === "link" && <NewLink studyId={studyId} copy={copy} onTold={onTold} />}
      </div>
      {revoke.isError && <Fault>{sentenceOf(revoke.error)}</Fault>}
    </li>
  );
}

function MoveEnd({ studyId, copyId, onMoved }: { studyId: string; copyId: string; onMoved: () => void }) {
  const move = useMoveEnd(studyId, copyId);
  return (
    <fieldset className="pt-2" disabled={move.isPending}>
      <legend className="type-small text-ink2">From now on the link opens</legend>
      <p className="flex flex-wrap gap-x-5">
        {LINK_ENDS.map(({ value, words }) => (
          <Word key={value} onClick={() => move.mutate(value, { onSuccess: onMoved })}>
            {words}
          </Word>
        ))}
      </p>
      {move.isError && <Fault>{sentenceOf(move.error)}</Fault>}
    </fieldset>
  );
}

interface NewLinkProps extends Pick<CopyEntryProps, "studyId" | "copy" | "onTold"> {}

function NewLink({ studyId, copy, onTold }: NewLinkProps) {
  const renew = useNewLink(studyId, copy.id);
  const [email, setEmail] = useState("");
  const told = (token: string) => onTold({ token, cellName: copy.cellName, sentTo: email.trim() });
  return (
    <form
      noValidate
      className="grid gap-3 pt-2"
      onSubmit={(event) => {
        event.preventDefault();
        renew.mutate(email.trim(), { onSuccess: ({ token }) => told(token) });
      }}
    >
      <Field
        label="Send it to"
        type="email"
        autoComplete="off"
        value={email}
        hint="May be left out. The old link opens nothing any more, as soon as there is a new one."
        fault={renew.isError ? sentenceOf(renew.error) : undefined}
        onChange={(event) => setEmail(event.target.value)}
      />
      <div>
        <Button type="submit" disabled={renew.isPending}>
          Make a new link
        </Button>
      </div>
    </form>
  );
}
