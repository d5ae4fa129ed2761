import type { PriceChangeFinding } from "../../../shared/schemas/price-change.ts";
import { capital } from "../../../shared/study/words.ts";
import { DECIMALS, printFixed } from "../../../shared/tables/numbers.ts";
import { Estimate } from "../../components/number.tsx";
import { Table } from "../../components/table.tsx";

const money = (value: number) => printFixed(value, DECIMALS.money);
const share = (value: number) => printFixed(value, DECIMALS.share);

/** Prices, taxes and budget shares, before and after. */
export function PricesView({ finding }: { finding: PriceChangeFinding }) {
  const { at, fitted } = finding;
  const { after } = at.shares;
  const taxed = at.taxes.some((tax) => tax !== 0);
  return (
    <Table
      caption="Prices and budget shares, before and after"
      heads={[
        { key: "good", content: "Good" },
        { key: "before", content: "Price before" },
        { key: "after", content: "After" },
        ...(taxed ? [{ key: "tax", content: "Tax in it" }] : []),
        { key: "shareBefore", content: "Share before" },
        ...(after ? [{ key: "shareAfter", content: "After" }] : []),
      ]}
      lines={fitted.goods.map((good, i) => {
        return {
          key: good,
          head: capital(good),
          cells: [
            money(at.pricesBefore[i]),
            money(at.pricesAfter[i]),
            ...(taxed ? [money(at.taxes[i])] : []),
            <Estimate key="b" value={share(at.shares.before.values[i])} error={share(at.shares.before.errors[i])} />,
            ...(after ? [<Estimate key="a" value={share(after.values[i])} error={share(after.errors[i])} />] : []),
          ],
        };
      })}
    />
  );
}
