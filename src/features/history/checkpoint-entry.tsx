import { useState } from "react";
import type { CheckpointSummary } from "../../../shared/schemas/history.ts";
import type { CellSource } from "../../../shared/study/cell-source.ts";
import { counted } from "../../../shared/study/words.ts";
import { Word } from "../../components/button.tsx";
import { Fault } from "../../components/field.tsx";
import { sentenceOf } from "../../lib/api.ts";
import { momentInWords } from "../../lib/dates.ts";
import { api } from "../../lib/paths.ts";
import { useChangeCheckpoint, useRemoveCheckpoint } from "./api/change-checkpoints.ts";
import { CheckpointForm } from "./checkpoint-form.tsx";
import { ReturnToCheckpoint } from "./return-to-checkpoint.tsx";
import { SinceCheckpoint } from "./since-checkpoint.tsx";
import { writersInWords } from "./words.ts";

export interface CheckpointRights {
  readonly make: boolean;
  readonly remove: boolean;
}

interface CheckpointEntryProps {
  readonly studyId: string;
  readonly checkpoint: CheckpointSummary;
  readonly cells: readonly CellSource[];
  readonly you: string;
  readonly may: CheckpointRights;
  readonly hindrance?: string;
  readonly onReturn: (cells: readonly CellSource[], name: string) => void;
}

type Opened = "since" | "return" | "words" | "remove";

/** One checkpoint: its name, who kept it when, and what can be done with it. */
export function CheckpointEntry(props: CheckpointEntryProps) {
  const { studyId, checkpoint, cells, you, may, hindrance, onReturn } = props;
  const [opened, setOpened] = useState<Opened>();
  const close = () => setOpened(undefined);
  const { id, name, note, occasion, madeBy, madeAt } = checkpoint;
  const action = (what: Opened, words: string) => (
    <Word quiet aria-expanded={opened === what} onClick={() => setOpened(opened === what ? undefined : what)}>
      {words} <span className="sr-only">{name}</span>
    </Word>
  );
  return (
    <li className="border-rule border-t py-3 last:border-b">
      <p className="font-serif font-medium text-[1.0625rem]/[1.5rem] wrap-anywhere">{name}</p>
      <p className="type-small text-ink2">
        {counted(checkpoint.cells, "cell")}, kept {occasion === "kept" ? "" : "by itself for "}
        {occasion === "kept" ? `by ${lower(writersInWords([madeBy], you))}` : lower(writersInWords([madeBy], you))},{" "}
        {momentInWords(madeAt)}
      </p>
      {note && opened !== "words" && <p className="pt-1 wrap-anywhere">{note}</p>}
      <div className="type-small flex flex-wrap items-baseline gap-x-4 gap-y-1 pt-1.5">
        {action("since", "What differs now")}
        {may.make && action("return", "Return to it")}
        {may.make && action("words", "Rename")}
        <a className="word word-quiet" href={api.checkpointFile(studyId, id)} download>
          Study file <span className="sr-only">of {name}</span>
        </a>
        {may.remove && action("remove", "Remove")}
      </div>
      {opened === "since" && <SinceCheckpoint studyId={studyId} checkpointId={id} cells={cells} />}
      {opened === "return" && (
        <ReturnToCheckpoint
          studyId={studyId}
          checkpoint={checkpoint}
          cells={cells}
          hindrance={hindrance}
          onReturn={onReturn}
          onClose={close}
        />
      )}
      {opened === "words" && <Rename studyId={studyId} checkpoint={checkpoint} onClose={close} />}
      {opened === "remove" && <Remove studyId={studyId} checkpoint={checkpoint} onClose={close} />}
    </li>
  );
}

const lower = (words: string) => (words === "You" ? "you" : words);

interface PartProps {
  readonly studyId: string;
  readonly checkpoint: CheckpointSummary;
  readonly onClose: () => void;
}

function Rename({ studyId, checkpoint, onClose }: PartProps) {
  const change = useChangeCheckpoint(studyId, checkpoint.id);
  return (
    <CheckpointForm
      words={{ name: checkpoint.name, note: checkpoint.note }}
      action={change.isPending ? "Renaming" : "Rename"}
      pending={change.isPending}
      fault={change.error ? sentenceOf(change.error) : undefined}
      onSubmit={(words) => change.mutate(words, { onSuccess: onClose })}
      onLeave={onClose}
    />
  );
}

function Remove({ studyId, checkpoint, onClose }: PartProps) {
  const remove = useRemoveCheckpoint(studyId, checkpoint.id);
  return (
    <div className="pt-2">
      <p>Removed, the state it holds cannot be returned to any more. The history of edits stays.</p>
      {remove.isError && <Fault>{sentenceOf(remove.error)}</Fault>}
      <p className="flex gap-5 pt-1">
        <Word disabled={remove.isPending} onClick={() => remove.mutate()}>
          Remove the checkpoint
        </Word>
        <Word quiet onClick={onClose}>
          Leave it
        </Word>
      </p>
    </div>
  );
}
