import { useId, useSyncExternalStore } from "react";
import { momentInWords } from "../../lib/dates.ts";
import { chooseFormats, formatChoice, onFormatsChange, PLACES, writeNumber } from "../../lib/formats.ts";

/** Another year, so that the whole of a date is seen. */
const EXAMPLE = new Date(2031, 2, 9, 14, 8);

/** Whose custom dates, times and counts follow on this machine, with an example of what is chosen. */
export function FormatsChoice() {
  const id = useId();
  const chosen = useSyncExternalStore(onFormatsChange, formatChoice);
  return (
    <div className="account-form">
      <div>
        <label htmlFor={id} className="type-small block pb-1 text-ink2">
          Written
        </label>
        <select
          id={id}
          className="field"
          value={chosen}
          aria-describedby={`${id}-example`}
          onChange={(event) => chooseFormats(event.target.value)}
        >
          <option value="">as the browser says ({navigator.language})</option>
          {PLACES.map(({ locale, place }) => (
            <option key={locale} value={locale}>
              as in {place}
            </option>
          ))}
        </select>
      </div>
      <p id={`${id}-example`} className="tabular-nums">
        {momentInWords(EXAMPLE)}; {writeNumber(104_938)} rows, {writeNumber(1.6, 1)} s
      </p>
      <p className="type-small max-w-[38rem] text-ink2">
        Kept on this machine. Findings, tables and formulas keep the decimal point and the comma between thousands, on
        the screen as in every copy and file, so that digits can be held against one another.
      </p>
    </div>
  );
}
