import { useId, useState } from "react";
import { type Compensation, mostChanged } from "../../../shared/economics/price-change/one-price.ts";
import type { PriceChangeFinding } from "../../../shared/schemas/price-change.ts";
import { capital } from "../../../shared/study/words.ts";
import { ChoiceControl } from "../form/fields.tsx";
import { PriceChangePicture } from "./picture/picture.tsx";

/** The picture of one price change, of a good to choose: the one whose price changes most unless said otherwise. */
export function PictureSection({ finding, by }: { finding: PriceChangeFinding; by: Compensation }) {
  const id = useId();
  const [chosen, setChosen] = useState("");
  const { goods } = finding.fitted;
  const good = goods.includes(chosen) ? chosen : mostChanged(finding);
  return (
    <section aria-labelledby={id} className="min-w-0">
      <div className="flex flex-wrap items-baseline justify-between gap-x-6">
        <h2 id={id} className="type-section">
          {capital(good)} against everything else
        </h2>
        <div className="w-40">
          <ChoiceControl
            aria-label="Good of the picture"
            value={good}
            choices={goods.map((value) => ({ value, label: capital(value) }))}
            onChange={setChosen}
            readOnly={false}
          />
        </div>
      </div>
      <PriceChangePicture finding={finding} good={good} by={by} />
    </section>
  );
}
