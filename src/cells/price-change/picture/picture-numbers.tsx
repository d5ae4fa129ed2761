import type { Compensation, OnePrice } from "../../../../shared/economics/price-change/one-price.ts";
import { capital } from "../../../../shared/study/words.ts";
import { DECIMALS, printFixed } from "../../../../shared/tables/numbers.ts";
import { ChartNumbers } from "../../../components/chart-numbers.tsx";

const BUNDLES = ["before", "compensated", "after"] as const;

interface NumbersProps {
  readonly one: OnePrice;
  readonly by: Compensation;
  readonly decimals: number;
}

/** The bundles and budgets of the picture. */
export function PictureNumbers({ one, by, decimals }: NumbersProps) {
  const { good, bundles, budgets } = one;
  const money = (value: number) => printFixed(value, DECIMALS.money);
  return (
    <ChartNumbers
      caption={`${capital(good)} against everything else, units uploaded`}
      heads={[
        { key: "bundle", content: "Bundle" },
        { key: "price", content: "Price" },
        { key: "quantity", content: "Quantity" },
        { key: "rest", content: "Everything else" },
        { key: "total", content: "Costs" },
      ]}
      lines={BUNDLES.flatMap((which) => {
        const [spot, budget] = [bundles[which], budgets[which]];
        if (!spot || !budget) return [];
        const how = which === "compensated" ? (by === "hicks" ? ", utility kept" : ", bundle affordable") : "";
        return [
          {
            key: which,
            head: `${capital(which)}${how}`,
            cells: [money(budget.price), printFixed(spot.quantity, decimals), money(spot.rest), money(budget.total)],
          },
        ];
      })}
    />
  );
}
