import type { DataFinding } from "../../../shared/schemas/data.ts";
import { capital } from "../../../shared/study/words.ts";
import { DECIMALS, printCount, printFixed, printPercent } from "../../../shared/tables/numbers.ts";
import { countedRows } from "../../../shared/tables/phrases.ts";
import { Table } from "../../components/table.tsx";

function Share({ share, largest }: { share: number; largest: number }) {
  return (
    <span className="flex items-center justify-end gap-3">
      <span aria-hidden="true" className="relative h-px w-16 shrink bg-rule max-[599px]:hidden">
        <span
          className="absolute inset-y-[-2.5px] left-0 bg-ink2"
          style={{ width: `${Math.max(0, (share / largest) * 82)}%` }}
        />
      </span>
      {printFixed(share, DECIMALS.share)}
    </span>
  );
}

/** Shares and prices described, good by good. */
export function Description({ finding }: { finding: DataFinding }) {
  const largest = Math.max(...finding.goods.map((good) => good.meanShare));
  const sum = finding.goods.reduce((total, good) => total + good.meanShare, 0);
  return (
    <>
      <Table
        caption={`Shares and prices over ${countedRows(finding.accounting.used)} used`}
        heads={[
          { key: "good", content: finding.weighted ? "Rows used, weighted" : "Rows used" },
          { key: "share", content: "Mean share" },
          { key: "deviation", content: "Std. dev." },
          { key: "none", content: "Bought none" },
          { key: "price", content: "Mean price" },
          {
            key: "log",
            content: (
              <>
                Std. dev. ln <i className="font-serif">p</i>
              </>
            ),
          },
        ]}
        lines={finding.goods.map((good) => ({
          key: good.name,
          head: capital(good.name),
          cells: [
            <Share key="share" share={good.meanShare} largest={largest} />,
            printFixed(good.shareDeviation, DECIMALS.share),
            printPercent(good.boughtNone),
            printFixed(good.meanPrice, DECIMALS.money),
            printFixed(good.logPriceDeviation, DECIMALS.deviation),
          ],
        }))}
      />
      <p className="mt-2 type-small text-ink2">
        Shares sum to {printFixed(Number(sum.toFixed(10)), Number.isInteger(Number(sum.toFixed(10))) ? 0 : 4)}. Mean
        total expenditure {printFixed(finding.meanTotal, DECIMALS.money)}; prices and expenditure in the units uploaded.
        {finding.clusters !== undefined && ` ${printCount(finding.clusters)} clusters.`}
      </p>
    </>
  );
}
