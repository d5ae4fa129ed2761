import { useId, useState } from "react";
import type { Remark } from "../../../shared/schemas/remarks.ts";
import { counted } from "../../../shared/study/words.ts";
import { Word } from "../../components/button.tsx";
import { Dialog } from "../../components/dialog.tsx";
import { SwitchWords } from "../../components/switch-words.tsx";
import { Unfetched } from "../../components/unfetched.tsx";
import { sentenceOf } from "../../lib/api.ts";
import { useRemarks } from "./api/list-remarks.ts";
import { anchorInWords } from "./letters.ts";
import { RemarkEntry } from "./remark-entry.tsx";
import type { RemarkSetting } from "./remark-setting.ts";

interface RemarksDialogProps {
  readonly setting: RemarkSetting;
  readonly onClose: () => void;
  /** To the remark's cell. */
  readonly onGo: (remark: Remark) => void;
}

const WHICH = [
  { value: "open", word: "Open" },
  { value: "settled", word: "Settled" },
  { value: "all", word: "All" },
] as const;
type Which = (typeof WHICH)[number]["value"];

/** Every remark of the study, the newest first; also those on cells that have been removed. */
export default function RemarksDialog({ setting, onClose, onGo }: RemarksDialogProps) {
  const { data, error, refetch } = useRemarks(setting.studyId);
  const [which, setWhich] = useState<Which>("open");
  const [person, setPerson] = useState("");
  const shown = (data ?? [])
    .filter((remark) => isOf(remark, which) && (person === "" || hasWordsOf(remark, person)))
    .toReversed();
  return (
    <Dialog
      onClose={onClose}
      title="Remarks"
      lede="What was said of the cells, by owners, coauthors and readers. A referee copy has none of it."
    >
      <div className="flex flex-wrap items-baseline gap-x-8 gap-y-3 pb-4">
        <SwitchWords label="Which remarks" words={WHICH} value={which} onChange={setWhich} />
        <PersonChoice people={authorsOf(data ?? [])} value={person} onChange={setPerson} />
      </div>
      {error && <Unfetched sentence={sentenceOf(error)} onAgain={() => void refetch()} />}
      {!data && !error && (
        <p role="status" className="type-small pb-2 text-ink2">
          Fetching the remarks
        </p>
      )}
      {data && (
        <p role="status" className="type-small pb-2 text-ink2">
          {shown.length === 0 ? noneInWords(which, person !== "", data.length) : counted(shown.length, "remark")}
        </p>
      )}
      <ol className="remarks-all">
        {shown.map((remark) => (
          <RemarkEntry
            key={remark.id}
            setting={setting}
            remark={remark}
            above={<CellLine remark={remark} onGo={onGo} />}
          />
        ))}
      </ol>
    </Dialog>
  );
}

function CellLine({ remark, onGo }: { remark: Remark; onGo: (remark: Remark) => void }) {
  const about = remark.anchor === undefined ? "" : `, on ${anchorInWords(remark.anchor)}`;
  if (!remark.cellIsThere) {
    return (
      <p className="text-ink2">
        <span className="font-serif text-base">{remark.cellName}</span>
        {about}; the cell is not in the study any more
      </p>
    );
  }
  return (
    <p className="text-ink2">
      <Word onClick={() => onGo(remark)}>
        <span className="sr-only">Go to</span> <span className="font-serif text-base">{remark.cellName}</span>
      </Word>
      {about}
    </p>
  );
}

interface PersonChoiceProps {
  readonly people: ReadonlyMap<string, string>;
  readonly value: string;
  readonly onChange: (id: string) => void;
}

function PersonChoice({ people, value, onChange }: PersonChoiceProps) {
  const id = useId();
  return (
    <span className="flex items-baseline gap-3">
      <label htmlFor={id} className="type-small text-ink2">
        By
      </label>
      <select id={id} className="field-line w-auto!" value={value} onChange={(event) => onChange(event.target.value)}>
        <option value="">everyone</option>
        {[...people].map(([personId, name]) => (
          <option key={personId} value={personId}>
            {name}
          </option>
        ))}
      </select>
    </span>
  );
}

const isOf = ({ settled }: Remark, which: Which) =>
  which === "all" || (which === "settled") === (settled !== undefined);

const hasWordsOf = ({ author, replies }: Remark, person: string) =>
  author.id === person || replies.some((reply) => reply.author.id === person);

function authorsOf(remarks: readonly Remark[]): ReadonlyMap<string, string> {
  const people = remarks.flatMap(({ author, replies }) => [author, ...replies.map((reply) => reply.author)]);
  return new Map(people.map(({ id, name }) => [id, name]));
}

function noneInWords(which: Which, isOfOne: boolean, all: number): string {
  if (all === 0)
    return "Nothing has been remarked yet. Add a remark beside any cell, or press R while it has the focus.";
  const by = isOfOne ? " by this person" : "";
  return which === "all" ? `No remark${by}.` : `No remark${by} is ${which}.`;
}
