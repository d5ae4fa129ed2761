import { zodResolver } from "@hookform/resolvers/zod";
import { useForm } from "react-hook-form";
import { Button } from "../../components/button.tsx";
import { Fault } from "../../components/field.tsx";
import { LongField } from "../../components/long-field.tsx";
import { sentenceOf } from "../../lib/api.ts";
import { type SealForm as Fields, sealForm, useSealRefereeCopy } from "./api/seal-referee-copy.ts";

/** A matrix that can be sealed: its finding is current. */
export interface Sealable {
  readonly cellId: string;
  readonly name: string;
}

interface SealFormProps {
  readonly studyId: string;
  readonly matrices: readonly Sealable[];
  readonly onSealed: (token: string, cellName: string) => void;
}

export function SealForm({ studyId, matrices, onSealed }: SealFormProps) {
  const seal = useSealRefereeCopy(studyId);
  const { register, handleSubmit, formState } = useForm<Fields>({
    resolver: zodResolver(sealForm),
    defaultValues: { cellId: matrices[0]?.cellId ?? "", note: "", withholdAuthors: true },
  });
  if (matrices.length === 0) {
    return (
      <p className="type-finding">
        There is no matrix to seal yet: a slutsky cell has to be current. Estimate its system, and the matrix follows.
      </p>
    );
  }
  return (
    <form
      noValidate
      className="grid gap-5"
      onSubmit={handleSubmit((form) =>
        seal.mutate(form, { onSuccess: ({ token, copy }) => onSealed(token, copy.cellName) }),
      )}
    >
      <fieldset>
        <legend className="type-small pb-1 text-ink2">Matrix</legend>
        {matrices.map(({ cellId, name }) => (
          <label key={cellId} className="flex min-h-6 items-center gap-2.5 py-0.5">
            <input type="radio" value={cellId} className="choice-dot" {...register("cellId")} />
            <span className="font-serif font-medium text-[1.0625rem]">{name}</span>
          </label>
        ))}
      </fieldset>
      <LongField
        label="A note to the referee"
        rows={2}
        fault={formState.errors.note?.message}
        hint="May be left out. It is sealed with the rest."
        {...register("note")}
      />
      <label className="flex min-h-6 items-center gap-2.5">
        <input type="checkbox" className="choice-box" {...register("withholdAuthors")} />
        Withhold the authors' names
      </label>
      {seal.isError && <Fault>{sentenceOf(seal.error)}</Fault>}
      <div>
        <Button type="submit" filled disabled={seal.isPending}>
          {seal.isPending ? "Sealing" : "Seal a referee copy"}
        </Button>
      </div>
    </form>
  );
}
