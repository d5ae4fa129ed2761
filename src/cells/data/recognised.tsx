import type { Upload } from "../../../shared/schemas/resources.ts";
import type { Value } from "../../../shared/study/edit.ts";
import { columnsRecognised, type Suggestion, suggestGoods } from "../../../shared/study/suggest.ts";
import { capital, counted, listSome, listWords } from "../../../shared/study/words.ts";
import type { KeyPath, Written } from "../form/written.ts";
import { inWords } from "./goods-mapping.ts";

type Edit = readonly [path: KeyPath, value: Value | undefined];

const ROLES = ["total", "weight", "cluster", "time"] as const;
const AN: Readonly<Record<(typeof ROLES)[number], string>> = {
  total: "total expenditure",
  weight: "a weight",
  cluster: "a cluster",
  time: "the time",
};

const plain = (good: object) => ({ ...good }) as Record<string, string>;

/** The edits that take recognised goods over: beside those that are mapped already, never in their place. */
function takeOver({ goods, derive = {} }: Suggestion, fresh: readonly string[], none: boolean): Edit[] {
  const columns = new Set(fresh.flatMap((good) => Object.values(goods[good])));
  const derived = Object.entries(derive)
    .filter(([name]) => columns.has(name))
    .map(([name, expression]): Edit => [["derive", name], expression]);
  if (none) return [[["goods"], Object.fromEntries(fresh.map((good) => [good, plain(goods[good])]))], ...derived];
  return [...fresh.map((good): Edit => [["goods", good], plain(goods[good])]), ...derived];
}

/** What the names of the columns suggest and the cell does not say yet: offered in words, taken by a press. */
export function Recognised({ written, upload }: { written: Written; upload: Upload }) {
  const suggestion = suggestGoods(upload.columns);
  const mapped = Object.keys(written.map("goods"));
  const usedColumns = new Set(mapped.flatMap((good) => Object.values(written.map("goods", good))));
  // A good under another name is there already when its columns are.
  const fresh = Object.entries(suggestion.goods)
    .filter(
      ([good, columns]) => !mapped.includes(good) && !Object.values(columns).some((name) => usedColumns.has(name)),
    )
    .map(([good]) => good);
  const roles = ROLES.filter((key) => {
    const column = suggestion[key];
    return column !== undefined && written.text(key) === "" && !usedColumns.has(column);
  });
  if (fresh.length === 0 && roles.length === 0) return null;
  const none = mapped.length === 0;
  return (
    <fieldset aria-label="Recognised from column names" className="py-2 text-[0.875rem]/[1.25rem]">
      {fresh.length > 0 && (
        <p>
          {none ? (
            <>
              {capital(inWords(fresh.length))} {fresh.length === 1 ? "good" : "goods"} recognised from{" "}
              {counted(columnsRecognised({ ...suggestion, goods: only(suggestion.goods, fresh) }), "column")}:{" "}
              {listSome(fresh, 8)}.{" "}
            </>
          ) : (
            <>
              {capital(inWords(fresh.length))} more {fresh.length === 1 ? "good" : "goods"} recognised:{" "}
              {listSome(fresh, 8)}.{" "}
            </>
          )}
          <button type="button" className="word" onClick={() => written.write(...takeOver(suggestion, fresh, none))}>
            {fresh.length === 1 ? "Take it over" : "Take them over"}
          </button>
        </p>
      )}
      {roles.length > 0 && (
        <ul className="type-small flex flex-wrap gap-x-4 text-ink2">
          {roles.map((key) => (
            <li key={key}>
              <span className="type-source">{suggestion[key]}</span> may be {AN[key]}.{" "}
              <button type="button" className="word" onClick={() => written.write([[key], suggestion[key]])}>
                Use it <span className="sr-only">as {AN[key]}</span>
              </button>
            </li>
          ))}
        </ul>
      )}
      {fresh.length > 0 && suggestion.demographics.length > 0 && (
        <p className="type-small text-ink2">
          {listWords(suggestion.demographics.slice(0, 6))} may describe who buys: a system takes such columns as
          demographics.
        </p>
      )}
    </fieldset>
  );
}

function only(goods: Suggestion["goods"], names: readonly string[]): Suggestion["goods"] {
  return Object.fromEntries(names.map((name) => [name, goods[name]]));
}
