import type { UseFormRegister } from "react-hook-form";
import type { SealForm } from "./api/seal-referee-copy.ts";
import type { Sealable } from "./sealable.ts";

interface AlsoChoiceProps {
  /** Every current cell but the matrix that is sealed. */
  readonly cells: readonly Sealable[];
  readonly register: UseFormRegister<SealForm>;
}

/** Which further findings go with the matrix. */
export function AlsoChoice({ cells, register }: AlsoChoiceProps) {
  if (cells.length === 0) return null;
  return (
    <fieldset>
      <legend className="type-small pb-1 text-ink2">Sealed with it, if you like</legend>
      <div className="grid gap-x-6 min-[600px]:grid-cols-2">
        {cells.map(({ cellId, name, kind }) => (
          <label key={cellId} className="flex min-h-6 items-center gap-2.5 py-0.5">
            <input type="checkbox" value={cellId} className="choice-box" {...register("also")} />
            <span>
              <span className="font-serif font-medium text-[1.0625rem]">{name}</span>{" "}
              <i className="font-serif text-ink2">{kind}</i>
            </span>
          </label>
        ))}
      </div>
      {cells.some(({ kind }) => kind === "text") && (
        <p className="type-small pt-1 text-ink2">
          Texts are sealed as they read now, numbers included: look for names in them that are to be withheld.
        </p>
      )}
    </fieldset>
  );
}
