import { useEffect, useRef, useState } from "react";
import type { NewReplicationBundle } from "../../../shared/schemas/replication-bundle.ts";
import { Button } from "../../components/button.tsx";
import { Dialog } from "../../components/dialog.tsx";
import { Fault } from "../../components/field.tsx";
import { sentenceOf } from "../../lib/api.ts";
import { useMakeBundle } from "./api/make-bundle.ts";
import { leftOutInWords, type OfStudy, sizeInWords } from "./bundle-words.ts";

interface ReplicationDialogProps {
  readonly studyId: string;
  readonly cells: readonly OfStudy[];
  readonly onClose: () => void;
}

/** Makes a replication bundle and hands it to the browser; going away before it is there cancels it. */
export default function ReplicationDialog({ onClose, ...contents }: ReplicationDialogProps) {
  return (
    <Dialog
      onClose={onClose}
      title="Replication bundle"
      lede="One zip with the specification, every current finding as JSON and as tables, all coefficients with their full covariance, the methods paragraphs and their references. A command of this program estimates it again and compares every number."
    >
      <Contents {...contents} />
    </Dialog>
  );
}

function Contents({ studyId, cells }: Omit<ReplicationDialogProps, "onClose">) {
  const make = useMakeBundle(studyId);
  const [data, setData] = useState<NewReplicationBundle["data"]>("withheld");
  const running = useRef<AbortController>(undefined);
  useEffect(() => () => running.current?.abort(), []);
  const leftOut = leftOutInWords(cells);
  const begin = () => {
    running.current = new AbortController();
    make.mutate({ data, signal: running.current.signal });
  };
  const stop = () => {
    running.current?.abort();
    make.reset();
  };
  return (
    <div className="grid gap-5">
      <fieldset className="grid gap-2" disabled={make.isPending}>
        <legend className="type-small pb-1 text-ink2">The data</legend>
        <Choice value="withheld" chosen={data} onChoose={setData} words="stay here">
          The bundle holds the fingerprint of each file and, where a system can be estimated from them, the second
          moments of its rows. Whoever has the files gives them to the command.
        </Choice>
        <Choice value="included" chosen={data} onChoose={setData} words="go along">
          Every file that a cell reads, whole, as it was uploaded: columns that no cell uses too. Look first whether its
          owner, the law on data protection and the survey's rules of confidentiality allow it; they come first.
        </Choice>
      </fieldset>
      {leftOut && <p className="type-small max-w-[40rem] text-ink2">{leftOut}</p>}
      {make.isError && <Fault>{sentenceOf(make.error)}</Fault>}
      <div className="flex flex-wrap items-baseline gap-4">
        {make.isPending ? (
          <Button onClick={stop}>Stop</Button>
        ) : (
          <Button filled onClick={begin}>
            Make the bundle
          </Button>
        )}
        <p role="status" className="type-small text-ink2">
          {make.isPending && "The bundle is being written."}
          {make.isSuccess && `${make.data.name}, ${sizeInWords(make.data.bytes)}, is with your browser's downloads.`}
        </p>
      </div>
      <p className="type-small max-w-[40rem] text-ink2">
        With the program at hand:{" "}
        <code className="type-source bg-verso px-1">npm run --silent replicate -- bundle.zip</code>
      </p>
    </div>
  );
}

interface ChoiceProps {
  readonly value: NewReplicationBundle["data"];
  readonly chosen: string;
  readonly onChoose: (value: NewReplicationBundle["data"]) => void;
  readonly words: string;
  readonly children: React.ReactNode;
}

function Choice({ value, chosen, onChoose, words, children }: ChoiceProps) {
  return (
    <label className="flex items-baseline gap-2.5 py-0.5">
      <input
        type="radio"
        name="data"
        className="choice-dot translate-y-0.5"
        checked={chosen === value}
        onChange={() => onChoose(value)}
      />
      <span>
        <span className="font-medium">{words}</span>
        <span className="type-small block max-w-[40rem] text-ink2">{children}</span>
      </span>
    </label>
  );
}
