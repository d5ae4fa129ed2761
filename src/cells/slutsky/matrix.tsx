import { type KeyboardEvent, useEffect, useRef } from "react";
import { capital } from "../../../shared/study/words.ts";
import { AnchorMark } from "../../components/anchor-mark.tsx";
import { commandOf } from "../../lib/keys.ts";
import { MatrixEntry } from "./matrix-entry.tsx";
import { moveBy, type Place } from "./moves.ts";
import type { MatrixSetting, ShownMatrix } from "./shown-matrix.ts";

interface MatrixFieldProps {
  readonly shown: ShownMatrix;
  readonly setting: MatrixSetting;
  readonly label: string;
  readonly pointed?: Place;
  readonly onPoint?: (place: Place) => void;
  /** Row and column sums, printed outside the coloured field. */
  readonly sums?: { readonly rows: readonly string[]; readonly columns: readonly string[] };
}

function ColumnHeads({ shown, setting, pointed, sums }: Omit<MatrixFieldProps, "label" | "onPoint">) {
  const turned = setting === "phone" || setting === "many";
  return (
    <tr>
      <td
        className={`sticky left-0 z-2 bg-recto pb-1 align-bottom text-[0.8125rem] text-ink2 ${setting === "phone" ? "w-[6.6rem]" : ""}`}
      >
        {shown.unit}
      </td>
      {shown.goods.map((good, j) => (
        <th
          key={good}
          scope="col"
          className={`align-bottom text-[0.8125rem]/[1.0625rem] ${
            pointed?.[1] === j ? "font-semibold text-accent" : "font-normal text-ink2"
          } ${turned ? "pb-1" : "max-w-[79px] pr-2 pb-1.5 text-right"}`}
        >
          {turned ? (
            <span className="inline-block max-h-36 rotate-180 text-left [writing-mode:vertical-rl]">
              {capital(good)}
            </span>
          ) : (
            capital(good)
          )}
        </th>
      ))}
      {sums && (
        <th scope="col" className="pb-1.5 pl-4 text-right align-bottom text-[0.8125rem] font-normal text-ink2">
          Row sum
        </th>
      )}
    </tr>
  );
}

function Sums({ sums }: { sums: NonNullable<MatrixFieldProps["sums"]> }) {
  return (
    <tr>
      <th scope="row" className="sticky left-0 z-2 bg-recto py-2 text-left text-[0.8125rem] font-normal text-ink2">
        Column sum
      </th>
      {sums.columns.map((sum, index) => (
        <td key={index} className="pr-2 text-right text-[0.8125rem] text-ink2 tabular-nums">
          {sum}
        </td>
      ))}
      <td />
    </tr>
  );
}

/** Keeps the keyboard's focus on the entry pointed at, once it is in the matrix at all. */
function useFollowedFocus(pointed: Place | undefined) {
  const ref = useRef<HTMLTableElement>(null);
  const key = pointed?.join(",");
  useEffect(() => {
    const table = ref.current;
    if (!key || !table?.contains(document.activeElement)) return;
    table.querySelector<HTMLElement>(`[data-place="${key}"]`)?.focus({ preventScroll: false });
  }, [key]);
  return ref;
}

/** The Slutsky matrix as a field of signed colour: every entry has its sign printed, so colour carries nothing alone. */
export function MatrixField({ shown, setting, label, pointed, onPoint, sums }: MatrixFieldProps) {
  const ref = useFollowedFocus(pointed);
  const onKeyDown = (event: KeyboardEvent) => {
    const command = onPoint && pointed ? commandOf("matrix", event) : undefined;
    if (!onPoint || !pointed || !command) return;
    event.preventDefault();
    onPoint(moveBy(command, pointed, shown.goods.length));
  };
  return (
    <div className="relative -m-1 overflow-x-auto p-1">
      <table
        ref={ref}
        role={onPoint ? "grid" : undefined}
        aria-label={label}
        onKeyDown={onKeyDown}
        className={`border-separate border-spacing-px ${setting === "phone" ? "w-full table-fixed" : ""}`}
      >
        <thead>
          <ColumnHeads shown={shown} setting={setting} pointed={pointed} sums={sums} />
        </thead>
        <tbody>
          {shown.goods.map((good, i) => (
            <tr key={good}>
              <th
                scope="row"
                className={`sticky left-0 z-2 bg-recto pr-3 text-left text-[0.875rem]/[1.125rem] ${setting === "errors" ? "w-[102px] min-w-[102px]" : ""} ${
                  pointed?.[0] === i ? "font-semibold text-accent" : "font-normal"
                }`}
              >
                {capital(good)}
                <AnchorMark of={`row ${capital(good)}`} />
              </th>
              {shown.goods.map((column, j) => (
                <MatrixEntry
                  key={column}
                  shown={shown}
                  setting={setting}
                  pointed={pointed}
                  onPoint={onPoint}
                  place={[i, j]}
                />
              ))}
              {sums && <td className="pl-4 text-right text-[0.8125rem] text-ink2 tabular-nums">{sums.rows[i]}</td>}
            </tr>
          ))}
          {sums && <Sums sums={sums} />}
        </tbody>
      </table>
    </div>
  );
}
