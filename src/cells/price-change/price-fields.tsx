import { type GoodPriceSpecification, PRICE_RULES } from "../../../shared/schemas/price-change.ts";
import { capital } from "../../../shared/study/words.ts";
import { CheckField } from "../form/check-field.tsx";
import { type Choice, ChoiceField } from "../form/fields.tsx";
import { NumberField } from "../form/number-field.tsx";
import type { Written } from "../form/written.ts";
import type { PriceRule } from "./rates.ts";

const RULES: readonly Choice[] = [
  { value: "per cent", label: "by per cent" },
  { value: "to", label: "to a price" },
  { value: "ad valorem", label: "tax in per cent of what the seller gets" },
  { value: "specific", label: "tax per unit" },
];

const NUMBERS: Readonly<Record<PriceRule, string>> = {
  "per cent": "Per cent",
  to: "New price",
  "ad valorem": "Per cent",
  specific: "Per unit",
};

interface PriceFieldsProps {
  readonly written: Written;
  readonly readOnly: boolean;
  readonly goods: readonly string[];
}

/** Good by good, how its price changes; one that is not named keeps its price. */
export function PriceFields({ written, readOnly, goods }: PriceFieldsProps) {
  const named = Object.keys(written.map("prices"));
  const all = [...goods, ...named.filter((good) => !goods.includes(good))];
  return (
    <fieldset className="py-1.5">
      <legend className="mb-1 text-[0.875rem]/[1.25rem] text-ink2">Prices, units uploaded</legend>
      {all.map((good) => (
        <GoodFields key={good} good={good} written={written} readOnly={readOnly} />
      ))}
    </fieldset>
  );
}

const isTaxByName = (rule: PriceRule | undefined) => rule === "ad valorem" || rule === "specific";

function GoodFields({ good, written, readOnly }: Omit<PriceFieldsProps, "goods"> & { good: string }) {
  const change = written.map("prices", good) as GoodPriceSpecification;
  const rule = PRICE_RULES.find((one) => change[one] !== undefined);
  const taxed = isTaxByName(rule) || change.tax === true;
  const path = (key: string) => ["prices", good, key] as const;
  return (
    <>
      <ChoiceField
        label={capital(good)}
        value={rule ?? ""}
        none="keeps its price"
        choices={RULES}
        readOnly={readOnly}
        onChange={(next) =>
          written.write([["prices", good], next === "" ? undefined : { [next]: next === "to" ? 1 : 0 }])
        }
      />
      {rule !== undefined && (
        <div className="mb-1 ml-5.5">
          <NumberField label={NUMBERS[rule]} path={path(rule)} written={written} readOnly={readOnly} required />
          {!isTaxByName(rule) && (
            <CheckField
              label="A tax"
              checked={change.tax === true}
              readOnly={readOnly}
              onChange={(isTax) =>
                written.write(...(isTax ? [] : [[path("pass-through"), undefined] as const]), [
                  path("tax"),
                  isTax ? true : undefined,
                ])
              }
            />
          )}
          {taxed && (
            <NumberField
              label="Passed on"
              path={path("pass-through")}
              written={written}
              readOnly={readOnly}
              otherwise="1"
            />
          )}
        </div>
      )}
    </>
  );
}
