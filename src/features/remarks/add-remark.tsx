import { type RefObject, useRef, useState } from "react";
import { Word } from "../../components/button.tsx";
import { useAddRemark } from "./api/change-remarks.ts";
import { hasDraft } from "./drafts.ts";
import { placesOf, type RemarkedCell } from "./places.ts";
import { RemarkForm } from "./remark-form.tsx";
import type { RemarkSetting } from "./remark-setting.ts";

interface AddRemarkProps {
  readonly setting: RemarkSetting;
  readonly cell: RemarkedCell;
  readonly margin: RefObject<HTMLElement | null>;
}

/** *Add a remark*, and the field it opens. */
export function AddRemark({ setting, cell, margin }: AddRemarkProps) {
  const [places, setPlaces] = useState<readonly string[]>();
  const word = useRef<HTMLButtonElement>(null);
  const add = useAddRemark(setting.studyId);
  const of = `cell/${cell.id}`;
  if (places !== undefined) {
    return (
      <RemarkForm
        setting={setting}
        label={`Remark on ${cell.name}`}
        of={of}
        word="Add the remark"
        places={places}
        send={(draft) => add.mutateAsync({ cellId: cell.id, ...draft })}
        onDone={() => {
          setPlaces(undefined);
          // Once the word is there again.
          setTimeout(() => word.current?.focus(), 0);
        }}
      />
    );
  }
  const isBegun = hasDraft(setting.me.id, `${setting.studyId}/${of}`);
  return (
    <Word
      ref={word}
      quiet
      data-begins-remark
      data-start-remark
      className="remarks-add type-small"
      onClick={() => setPlaces(placesOf(margin.current?.parentElement ?? null, cell))}
    >
      {isBegun ? "Go on with your remark" : "Add a remark"} <span className="sr-only">on {cell.name}</span>
    </Word>
  );
}
