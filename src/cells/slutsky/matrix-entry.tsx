import { capital } from "../../../shared/study/words.ts";
import { AnchorMark } from "../../components/anchor-mark.tsx";
import { ErrorBelow } from "../../components/number.tsx";
import type { Place } from "./moves.ts";
import { isDeep, scaleToken } from "./scale.ts";
import type { MatrixSetting, ShownMatrix } from "./shown-matrix.ts";

const SIZES: Record<MatrixSetting, string> = {
  errors: "h-[54px] w-[79px] min-w-[79px] px-2 text-[0.875rem]/[1.125rem]",
  plain: "h-[30px] w-[66px] min-w-[66px] px-2 type-small",
  many: "h-[40px] w-[40px] min-w-[40px] px-0.5 text-[0.71875rem]/[1rem]",
  phone: "h-[41px] min-w-[37px] px-0.5 text-[0.875rem]/[1.125rem]",
};
const CENTRED: Record<MatrixSetting, string> = {
  errors: "text-right",
  plain: "text-right",
  many: "text-center",
  phone: "text-center",
};

/** The accent ring with a recto ring inside it; the mirror's the same, dashed. */
const RING = "z-1 outline-[2.5px] outline-accent -outline-offset-1 shadow-[inset_0_0_0_3.5px_var(--recto)]";

function entryLabel(shown: ShownMatrix, i: number, j: number): string {
  const value = shown.full(shown.entries[i][j]);
  const error = shown.full(shown.errors[i][j]);
  return `${shown.goods[i]}, price of ${shown.goods[j]}: ${value}, standard error ${error}`;
}

interface EntryProps {
  readonly shown: ShownMatrix;
  readonly setting: MatrixSetting;
  readonly pointed?: Place;
  readonly onPoint?: (place: Place) => void;
  readonly place: Place;
}

/** One entry of the field: its colour, its sign, and the ring when it or its mirror is pointed at. */
export function MatrixEntry({ shown, setting, pointed, onPoint, place }: EntryProps) {
  const [i, j] = place;
  const token = scaleToken(shown.entries[i][j], shown.steps);
  const isPointed = pointed?.[0] === i && pointed[1] === j;
  const isMirror = pointed !== undefined && pointed[0] === j && pointed[1] === i && !isPointed;
  const ink = isDeep(token) ? "text-recto print:text-ink! [[data-theme=dark]_&]:text-paper" : "text-ink";
  const ring = isPointed ? `${RING} outline-solid` : isMirror ? `${RING} outline-dashed` : "";
  const interactive = onPoint !== undefined;
  return (
    <td
      {...(interactive && {
        role: "gridcell",
        "aria-label": entryLabel(shown, i, j),
        "aria-selected": isPointed,
        tabIndex: isPointed ? 0 : -1,
        onPointerEnter: () => onPoint(place),
        onClick: () => onPoint(place),
      })}
      data-place={`${i},${j}`}
      data-mirror={isMirror || undefined}
      data-step={token}
      style={{ backgroundColor: `var(--${token})` }}
      className={`relative ${SIZES[setting]} ${CENTRED[setting]} tabular-nums print:border print:border-rule2 print:bg-transparent! ${ink} ${ring}`}
    >
      {shown.short(shown.entries[i][j])}
      {setting === "errors" && (
        <span className="[&>span]:text-current">
          <ErrorBelow error={shown.full(shown.errors[i][j])} />
        </span>
      )}
      <span className="matrix-mark">
        <AnchorMark of={`entry ${capital(shown.goods[i])}, ${capital(shown.goods[j])}`} />
      </span>
    </td>
  );
}
