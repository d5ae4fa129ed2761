import { useState } from "react";
import type { DataFinding } from "../../../shared/schemas/data.ts";
import { uploadRead } from "../../../shared/study/uploads.ts";
import { capital } from "../../../shared/study/words.ts";
import { DECIMALS, printFixed, printPercent } from "../../../shared/tables/numbers.ts";
import { TableScroller } from "../../components/table-scroller.tsx";
import { TextControl } from "../form/fields.tsx";
import { readWritten, type Written } from "../form/written.ts";
import type { FormProps } from "../types.ts";
import { columnChoices } from "./column-choices.ts";
import { ColumnChooser } from "./column-chooser.tsx";
import { chooseColumn, FOLLOWS, follows, mappingOf, SLOTS } from "./goods-mapping.ts";
import { moveGood, moveGoodTo, renameGood } from "./goods-order.ts";
import { MoveHandle } from "./move-handle.tsx";
import { Recognised } from "./recognised.tsx";

interface GoodsTableProps {
  readonly form: FormProps;
  /** What the goods came out as, when a finding is shown beside their columns. */
  readonly found?: DataFinding["goods"];
}

const LINK = "word type-small";

interface GoodRowProps extends GoodsTableProps {
  readonly good: string;
  readonly written: Written;
  readonly choices: ReturnType<typeof columnChoices>;
  readonly order: Order;
}

/** How goods change names and places. */
interface Order {
  readonly rename: (good: string, name: string) => void;
  readonly move: (good: string, by: 1 | -1) => void;
  readonly drag: (good: string | undefined) => void;
  /** What is dragged is let go over a good. */
  readonly drop: (target: string) => void;
  readonly dragged: string | undefined;
}

function GoodRow({ good, written, choices, form, found, order }: GoodRowProps) {
  const [over, setOver] = useState(false);
  const mapping = mappingOf(written, good);
  const description = found?.find((one) => one.name === good);
  return (
    <tr
      className={`border-rule border-b ${over && order.dragged !== undefined && order.dragged !== good ? "bg-accent-wash" : ""}`}
      onDragOver={(event) => {
        if (order.dragged === undefined) return;
        event.preventDefault();
        setOver(true);
      }}
      onDragLeave={() => setOver(false)}
      onDrop={(event) => {
        if (order.dragged === undefined) return;
        event.preventDefault();
        setOver(false);
        order.drop(good);
      }}
    >
      <th scope="row" className="min-w-[7.5rem] py-1 pr-3 text-left text-[0.875rem]/[1.25rem] font-semibold">
        {form.readOnly ? (
          capital(good)
        ) : (
          <span className="flex items-center gap-1">
            <MoveHandle
              good={good}
              onMove={(by) => order.move(good, by)}
              onDrag={(dragged) => order.drag(dragged ? good : undefined)}
            />
            <TextControl
              aria-label={`Name of ${good}`}
              value={good}
              readOnly={false}
              onCommit={(name) => order.rename(good, name)}
            />
          </span>
        )}
      </th>
      {SLOTS.map((slot) => (
        <td key={slot} className="min-w-[7rem] py-1 pr-3">
          <ColumnChooser
            aria-label={`${capital(slot)} of ${good}`}
            value={mapping[slot] ?? ""}
            choices={choices}
            none={follows(mapping, slot) ? FOLLOWS[slot] : "choose"}
            readOnly={form.readOnly}
            onChange={(column) => written.write(...chooseColumn(mapping, good, slot, column))}
          />
        </td>
      ))}
      {found && (
        <td className="type-small min-w-50 py-1">
          {description &&
            `share ${printFixed(description.meanShare, DECIMALS.share)}, ${
              description.boughtNone === 0 ? "bought by all" : `${printPercent(description.boughtNone)} bought none`
            }`}
        </td>
      )}
      {!form.readOnly && (
        <td className="py-1 pl-2 text-right">
          <button
            type="button"
            aria-label={`Remove ${good}`}
            className={LINK}
            onClick={() => written.write([["goods", good], undefined])}
          >
            Remove
          </button>
        </td>
      )}
    </tr>
  );
}

function AddGood({ written, goods }: { written: Written; goods: readonly string[] }) {
  const [said, setSaid] = useState("");
  const add = (name: string) => {
    if (name === "") return;
    if (goods.includes(name)) return setSaid(`There is a good called ${name} already.`);
    setSaid("");
    written.write([["goods", name], {}]);
  };
  return (
    <div className="mt-2 flex max-w-sm items-baseline gap-3">
      <span className="shrink-0 text-[0.875rem]/[1.25rem] text-ink2">Add a good, by name</span>
      <TextControl aria-label="Name of a good to add" value="" readOnly={false} onCommit={add} />
      <span role="status" className="text-[0.8125rem] text-fail">
        {said}
      </span>
    </div>
  );
}

/** Goods to columns: two of price, expenditure and quantity each; the third is shown as what it follows from. */
export function GoodsTable({ form, found }: GoodsTableProps) {
  const written = readWritten("data", form);
  const goods = Object.keys(written.map("goods"));
  const upload = uploadRead(form.context.uploads, {
    upload: written.text("upload"),
    version: written.value("version"),
  });
  const choices = columnChoices(upload, Object.keys(written.map("derive")), true);
  const [dragged, setDragged] = useState<string>();
  const [said, setSaid] = useState("");
  const order: Order = {
    dragged,
    drag: setDragged,
    rename(good, name) {
      const renamed = renameGood(form.source, goods, good, name);
      setSaid(typeof renamed === "string" ? "" : renamed.no);
      if (typeof renamed !== "string" || renamed === form.source) return;
      if (form.onRenameGood) form.onRenameGood(good, name);
      else form.onChange(renamed);
    },
    move(good, by) {
      const to = goods.indexOf(good) + by;
      if (to < 0 || to >= goods.length) return;
      form.onChange(moveGood(form.source, goods, good, by));
      setSaid(`${capital(good)} is now ${to + 1} of ${goods.length}.`);
    },
    drop(target) {
      if (dragged !== undefined) form.onChange(moveGoodTo(form.source, goods, dragged, target));
      setDragged(undefined);
    },
  };
  return (
    <div>
      {goods.length > 0 && (
        <TableScroller label="Goods and their columns">
          <table className="w-full">
            <thead>
              <tr className="border-line border-b text-left type-small text-ink2">
                {["Good", "Price", "Expenditure", "Quantity", ...(found ? ["In the rows used"] : [])].map((head) => (
                  <th key={head} scope="col" className="pb-1 font-normal">
                    {head}
                  </th>
                ))}
                {!form.readOnly && (
                  <td>
                    <span className="sr-only">Remove</span>
                  </td>
                )}
              </tr>
            </thead>
            <tbody>
              {goods.map((good) => (
                <GoodRow
                  key={good}
                  good={good}
                  written={written}
                  choices={choices}
                  form={form}
                  found={found}
                  order={order}
                />
              ))}
            </tbody>
          </table>
        </TableScroller>
      )}
      <p role="status" className="type-small text-ink2">
        {said}
      </p>
      {!form.readOnly && upload && <Recognised written={written} upload={upload} />}
      {!form.readOnly && <AddGood written={written} goods={goods} />}
    </div>
  );
}
