import { useState } from "react";
import type { SystemSpecification } from "../../../shared/schemas/system.ts";
import { besideEachOther, type KeyBesideKey } from "../../../shared/study/specification-differences.ts";
import { counted } from "../../../shared/study/words.ts";
import { Word } from "../../components/button.tsx";
import { BesideLines, BesideSection, BesideWide } from "./beside.tsx";

interface KeysProps {
  readonly left: SystemSpecification;
  readonly right: SystemSpecification;
  readonly names: readonly [string, string];
}

const lineOf = ({ key, left, right, isSame }: KeyBesideKey) => ({
  key,
  head: key,
  left: left ?? <i className="text-ink2">not given</i>,
  right: right ?? <i className="text-ink2">not given</i>,
  isSame,
});

/** What two specifications ask differently, key beside key; what they share waits folded. */
export function KeysSection({ left, right, names }: KeysProps) {
  const [unfolded, setUnfolded] = useState(false);
  const keys = besideEachOther(left, right);
  const apart = keys.filter(({ isSame }) => !isSame);
  const shared = keys.filter(({ isSame }) => isSame);
  const said =
    apart.length === 0
      ? "Both ask the same."
      : `${counted(apart.length, "key")} of ${keys.length}, defaults filled in.`;
  return (
    <BesideSection title="What differs in the specification" said={said}>
      <BesideLines lines={(unfolded ? keys : apart).map(lineOf)} names={names} />
      {shared.length > 0 && (
        <BesideWide>
          <Word className="type-small" aria-expanded={unfolded} onClick={() => setUnfolded(!unfolded)}>
            {unfolded ? "Fold what is the same" : `The same in both: ${shared.map(({ key }) => key).join(", ")}`}
          </Word>
        </BesideWide>
      )}
    </BesideSection>
  );
}
