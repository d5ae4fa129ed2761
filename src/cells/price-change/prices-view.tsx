import type { PriceChangeFinding } from "../../../shared/schemas/price-change.ts";
import { capital } from "../../../shared/study/words.ts";
import { DECIMALS, printFixed, printPercent } from "../../../shared/tables/numbers.ts";
import { Estimate } from "../../components/number.tsx";
import { Table } from "../../components/table.tsx";

const money = (value: number) => printFixed(value, DECIMALS.money);
const share = (value: number) => printFixed(value, DECIMALS.share);

/** Prices, taxes, the range of the sample and budget shares, before and after. */
export function PricesView({ finding }: { finding: PriceChangeFinding }) {
  const { at, fitted, priceRange } = finding;
  const { after } = at.shares;
  const taxed = at.taxes.some((tax) => tax !== 0);
  return (
    <Table
      caption="Prices and budget shares, before and after"
      heads={[
        { key: "good", content: "Good" },
        { key: "before", content: "Price before" },
        { key: "after", content: "After" },
        { key: "change", content: "Change" },
        ...(taxed ? [{ key: "tax", content: "Tax in it" }] : []),
        { key: "range", content: "In the sample" },
        { key: "shareBefore", content: "Share before" },
        ...(after ? [{ key: "shareAfter", content: "After" }] : []),
      ]}
      lines={fitted.goods.map((good, i) => {
        const [before, now] = [at.pricesBefore[i], at.pricesAfter[i]];
        return {
          key: good,
          head: capital(good),
          cells: [
            money(before),
            money(now),
            now === before ? "none" : printPercent(now / before - 1),
            ...(taxed ? [money(at.taxes[i])] : []),
            `${money(priceRange.low[i])} to ${money(priceRange.high[i])}`,
            <Estimate key="b" value={share(at.shares.before.values[i])} error={share(at.shares.before.errors[i])} />,
            ...(after ? [<Estimate key="a" value={share(after.values[i])} error={share(after.errors[i])} />] : []),
          ],
        };
      })}
    />
  );
}
