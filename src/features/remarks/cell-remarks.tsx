import { type RefObject, useEffect, useId, useMemo, useRef } from "react";
import type { Remark } from "../../../shared/schemas/remarks.ts";
import { counted } from "../../../shared/study/words.ts";
import { letterId, saidId } from "../../components/anchor-mark.tsx";
import { Word } from "../../components/button.tsx";
import { commandOf } from "../../lib/keys.ts";
import { AddRemark } from "./add-remark.tsx";
import { goTo } from "./go-to.ts";
import type { RemarkedCell } from "./places.ts";
import { RemarkEntry } from "./remark-entry.tsx";
import type { RemarkSetting } from "./remark-setting.ts";
import { SettledRemarks } from "./settled-remarks.tsx";
import { useLevels } from "./use-levels.ts";

interface CellRemarksProps {
  readonly setting: RemarkSetting;
  readonly cell: RemarkedCell;
  readonly remarks: readonly Remark[];
  readonly letters: ReadonlyMap<string, string>;
  /** In an opened cell a word leads to them, and no letters. */
  readonly opened: boolean;
  /** Where they are folded: laid over the page. */
  readonly isOpen: boolean;
  readonly onOpen: (isOpen: boolean) => void;
}

/**
 * The remarks on a cell. In the right margin, level with what they speak of; where the page has no margin, letters at its
 * edge, or a word, that open them over it; on one column after the finding. Which of these, the style sheet says.
 */
export function CellRemarks({ setting, cell, remarks, letters, opened, isOpen, onOpen }: CellRemarksProps) {
  const id = useId();
  const margin = useRef<HTMLElement>(null);
  const open = useMemo(() => remarks.filter(({ settled }) => !settled), [remarks]);
  const { order, present } = useLevels(margin, open);
  const inOrder = open.toSorted((a, b) => order.indexOf(a.id) - order.indexOf(b.id));
  useLaidOver(margin, isOpen, () => onOpen(false));
  const lead = { id, isOpen, onOpen };
  return (
    <section
      ref={margin}
      aria-label={`Remarks on ${cell.name}`}
      className="remarks no-print"
      data-open={isOpen || undefined}
      data-opened={opened || undefined}
    >
      {opened ? (
        <LeadingWord {...lead} count={open.length} />
      ) : (
        open.length > 0 && <LetterStrip {...lead} remarks={inOrder} letters={letters} />
      )}
      <div id={id} className="remarks-page">
        <div className="remarks-close">
          <Word className="type-small" onClick={() => onOpen(false)}>
            Close <span className="sr-only">the remarks on {cell.name}</span>
          </Word>
        </div>
        {inOrder.length > 0 && (
          <ol className="remarks-open">
            {inOrder.map((remark) => (
              <RemarkEntry
                key={remark.id}
                setting={setting}
                remark={remark}
                letter={letters.get(remark.id)}
                onLetter={
                  remark.anchor !== undefined && present.has(remark.anchor)
                    ? () => goTo(letterId(remark.id))
                    : undefined
                }
              />
            ))}
          </ol>
        )}
        <SettledRemarks setting={setting} remarks={remarks.filter(({ settled }) => settled)} />
        <AddRemark setting={setting} cell={cell} margin={margin} />
      </div>
      {!opened && (
        <Word
          quiet
          data-begins-remark
          className="remarks-add-folded type-small"
          onClick={() => startIn(margin, onOpen)}
        >
          Add a remark <span className="sr-only">on {cell.name}</span>
        </Word>
      )}
    </section>
  );
}

interface LeadProps {
  readonly id: string;
  readonly isOpen: boolean;
  readonly onOpen: (isOpen: boolean) => void;
}

function LetterStrip({
  id,
  isOpen,
  onOpen,
  remarks,
  letters,
}: LeadProps & Pick<CellRemarksProps, "remarks" | "letters">) {
  const show = (remark: Remark) => {
    onOpen(true);
    setTimeout(goTo, 0, saidId(remark.id));
  };
  return (
    <ul className="remarks-letters" aria-label="Letters of the remarks">
      {remarks.map((remark) => (
        <li key={remark.id} data-letter={remark.id}>
          <button
            type="button"
            className="remark-letter"
            aria-expanded={isOpen}
            aria-controls={id}
            aria-label={`Remark ${letters.get(remark.id)} by ${remark.author.name}`}
            onClick={() => show(remark)}
          >
            {letters.get(remark.id)}
          </button>
        </li>
      ))}
    </ul>
  );
}

function LeadingWord({ id, isOpen, onOpen, count }: LeadProps & { count: number }) {
  return (
    <Word className="remarks-word type-small" aria-expanded={isOpen} aria-controls={id} onClick={() => onOpen(!isOpen)}>
      {count === 0 ? "Remarks" : counted(count, "remark")}
    </Word>
  );
}

/** Opens the folded remarks and begins a new one. */
function startIn(margin: RefObject<HTMLElement | null>, onOpen: (isOpen: boolean) => void): void {
  onOpen(true);
  setTimeout(() => margin.current?.querySelector<HTMLElement>("[data-start-remark]")?.click(), 0);
}

/** Escape, or a press elsewhere on the page, folds what is laid over it; the focus goes back to where it came from. */
function useLaidOver(margin: RefObject<HTMLElement | null>, isOpen: boolean, close: () => void): void {
  const latest = useRef(close);
  latest.current = close;
  useEffect(() => {
    const aside = margin.current;
    if (!isOpen || !aside) return;
    const before = document.activeElement;
    const onPointerDown = (event: PointerEvent) => {
      if (!(event.target instanceof Node) || aside.contains(event.target)) return;
      latest.current();
    };
    const onKeyDown = (event: KeyboardEvent) => {
      if (commandOf("remark", event) !== "giveUp" || event.defaultPrevented || !aside.contains(document.activeElement))
        return;
      event.preventDefault();
      latest.current();
      if (before instanceof HTMLElement) before.focus();
    };
    document.addEventListener("pointerdown", onPointerDown);
    aside.addEventListener("keydown", onKeyDown);
    return () => {
      document.removeEventListener("pointerdown", onPointerDown);
      aside.removeEventListener("keydown", onKeyDown);
    };
  }, [margin, isOpen]);
}
