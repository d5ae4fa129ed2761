import { dataSentence } from "../../../shared/tables/sentence.ts";
import { Headline } from "../headline.tsx";
import type { BandProps } from "../types.ts";
import { Description } from "./description.tsx";

/** A data cell in its band: how many rows are used, and shares and prices described. */
export function DataBand({ finding }: BandProps<"data">) {
  return (
    <div className="space-y-3">
      <Headline sentence={dataSentence(finding)} />
      <Description finding={finding} />
    </div>
  );
}
