import { dataDescriptionTable } from "../../../shared/tables/data-description.ts";
import { dataSentence } from "../../../shared/tables/sentence.ts";
import { CopyTable } from "../copy-table.tsx";
import { OpenHead } from "../headline.tsx";
import type { OpenProps } from "../types.ts";
import { Description } from "./description.tsx";
import { GoodsTable } from "./goods-table.tsx";
import { RowAccountingView } from "./row-accounting.tsx";
import { WorthKnowing } from "./worth-knowing.tsx";

/** A data cell in full: goods and their columns, what became of every row, what is worth knowing. */
export function DataOpen({ finding, form }: OpenProps<"data">) {
  return (
    <div className="space-y-6">
      <OpenHead sentence={dataSentence(finding)}>
        <CopyTable table={dataDescriptionTable(finding)} />
      </OpenHead>
      {form && (
        <section aria-labelledby="goods" className="border-line border-t pt-4">
          <div className="mb-1 flex flex-wrap items-baseline gap-x-4">
            <h2 id="goods" className="type-section">
              Goods
            </h2>
            <p className="type-small text-ink2">Any two of price, expenditure and quantity; the third follows.</p>
          </div>
          <GoodsTable form={form} found={finding.goods} />
        </section>
      )}
      <section aria-labelledby="description" className="border-line border-t pt-4">
        <h2 id="description" className="type-section mb-1">
          Shares and prices
        </h2>
        <Description finding={finding} />
      </section>
      <div className="border-line border-t pt-4">
        <RowAccountingView accounting={finding.accounting} onLook={form?.onLook} />
      </div>
      <WorthKnowing flags={finding.flags} onLook={form?.onLook} />
    </div>
  );
}
