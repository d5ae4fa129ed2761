import { memo, useId } from "react";
import { Word } from "../../components/button.tsx";
import type { Present } from "../../features/presence/present.ts";
import { KeyMarks } from "../../features/remarks/key-marks.tsx";
import type { RemarkSetting } from "../../features/remarks/remark-setting.ts";
import { Remarked } from "../../features/remarks/remarked.tsx";
import { bandId, focusBand } from "./addresses.ts";
import { BandFinding } from "./band-finding.tsx";
import { BandSource, type BandSourceProps } from "./band-source.tsx";
import { StateLine } from "./state-line.tsx";
import { TypingHere } from "./typing-here.tsx";
import { useHeldHeight } from "./use-held-height.ts";

export interface CellBandProps extends Omit<BandSourceProps, "headingId" | "onLeave" | "typing" | "title"> {
  readonly typing: readonly Present[];
  readonly remarking: RemarkSetting;
  readonly onFocus: (cellId: string) => void;
  /** Folded to a line: name, state, and the way to unfold it. */
  readonly isFolded: boolean;
  readonly onUnfold: (cellId: string) => void;
  /** On which edge a dragged cell would come to stand. */
  readonly edge?: "before" | "after";
}

/** A cell of the study: what is asked on the left page, what was found on the right. */
export const CellBand = memo(function CellBand({
  typing,
  remarking,
  onFocus,
  isFolded,
  onUnfold,
  edge,
  ...source
}: CellBandProps) {
  const headingId = useId();
  const { standing, studyId, connection, readOnly } = source;
  const { cell } = standing;
  const held = useHeldHeight(standing.fingerprint !== undefined);
  const onChange = readOnly ? undefined : (next: string) => connection.replaceSource(cell.id, next);
  return (
    <section
      id={bandId(cell.id)}
      aria-labelledby={headingId}
      tabIndex={-1}
      className={`band ${edge ? `band-drop-${edge}` : ""}`}
      onFocus={() => onFocus(cell.id)}
    >
      <Remarked setting={remarking} cell={cell}>
        <div className="verso">
          <BandSource
            {...source}
            {...(isFolded && {
              page: "closed" as const,
              onPage: (page) => {
                onUnfold(cell.id);
                source.onPage(page);
              },
            })}
            headingId={headingId}
            onLeave={() => focusBand(cell.id)}
            typing={typing.length > 0 && <TypingHere people={typing} className="wide-only mt-4 block" />}
          />
          <KeyMarks />
        </div>
        <div className="recto" ref={held}>
          {isFolded ? (
            <StateLine
              standing={standing}
              beside={<TypingHere people={typing} className="narrow-only" />}
              actions={
                <Word onClick={() => onUnfold(cell.id)}>
                  Unfold <span className="sr-only">{cell.name}</span>
                </Word>
              }
            />
          ) : (
            <BandFinding
              studyId={studyId}
              standing={standing}
              onChange={onChange}
              beside={<TypingHere people={typing} className="narrow-only" />}
            />
          )}
        </div>
      </Remarked>
      {typing.length > 0 && (
        <div aria-hidden="true" className="band-edge" style={{ background: `var(--who-${typing[0].colour.letter})` }} />
      )}
    </section>
  );
});
