import { zodResolver } from "@hookform/resolvers/zod";
import { type ReactNode, useId } from "react";
import { useForm } from "react-hook-form";
import type { RefereeCopySummary } from "../../../shared/schemas/referee-copies.ts";
import { Button } from "../../components/button.tsx";
import { Fault, Field } from "../../components/field.tsx";
import { LongField } from "../../components/long-field.tsx";
import { sentenceOf } from "../../lib/api.ts";
import { AlsoChoice } from "./also-choice.tsx";
import { useRefereeCopies } from "./api/list-referee-copies.ts";
import { type SealForm as Fields, sealForm, useSealRefereeCopy } from "./api/seal-referee-copy.ts";
import { copyInWords, isOpen } from "./copy-words.ts";
import { LINK_ENDS } from "./link-end.ts";
import type { Sealable } from "./sealable.ts";
import type { Told } from "./sealed-link.tsx";

interface SealFormProps {
  readonly studyId: string;
  readonly cells: readonly Sealable[];
  readonly onSealed: (told: Told) => void;
}

const NOTHING: readonly RefereeCopySummary[] = [];

export function SealForm({ studyId, cells, onSealed }: SealFormProps) {
  const seal = useSealRefereeCopy(studyId);
  const { data: copies = NOTHING } = useRefereeCopies(studyId);
  const matrices = cells.filter(({ kind }) => kind === "slutsky");
  const { register, handleSubmit, watch, formState } = useForm<Fields>({
    resolver: zodResolver(sealForm),
    defaultValues: {
      cellId: matrices[0]?.cellId ?? "",
      also: [],
      methods: false,
      note: "",
      withholdAuthors: true,
      opensFor: "",
      replaces: "",
      email: "",
    },
  });
  const matrix = watch("cellId");
  const replaceable = copies.filter(isOpen);
  if (matrices.length === 0) {
    return (
      <p className="type-finding">
        There is no matrix to seal yet: a slutsky cell has to be current. Estimate its system, and the matrix follows.
      </p>
    );
  }
  const { errors } = formState;
  return (
    <form
      noValidate
      className="grid gap-5"
      onSubmit={handleSubmit((form) =>
        seal.mutate(form, {
          onSuccess: ({ token, copy }) => onSealed({ token, cellName: copy.cellName, sentTo: form.email }),
        }),
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
      <AlsoChoice cells={cells.filter(({ cellId }) => cellId !== matrix)} register={register} />
      {errors.also && <Fault>{errors.also.message}</Fault>}
      <label className="flex min-h-6 items-center gap-2.5">
        <input type="checkbox" className="choice-box" {...register("methods")} />
        With the methods of its systems, as a paper would say them
      </label>
      <LongField
        label="A note to the referee"
        rows={2}
        fault={errors.note?.message}
        hint="May be left out. It is sealed with the rest."
        {...register("note")}
      />
      <label className="flex min-h-6 items-center gap-2.5">
        <input type="checkbox" className="choice-box" {...register("withholdAuthors")} />
        Withhold the authors' names
      </label>
      <div className="grid gap-x-6 gap-y-5 min-[600px]:grid-cols-2">
        <Choice label="The link opens" {...register("opensFor")}>
          {LINK_ENDS.map(({ value, words }) => (
            <option key={value} value={value}>
              {words}
            </option>
          ))}
        </Choice>
        {replaceable.length > 0 && (
          <Choice label="In the place of" {...register("replaces")}>
            <option value="">no earlier copy</option>
            {replaceable.map((copy) => (
              <option key={copy.id} value={copy.id}>
                {copyInWords(copy)}
              </option>
            ))}
          </Choice>
        )}
      </div>
      <Field
        label="Send the link to"
        type="email"
        autoComplete="off"
        fault={errors.email?.message}
        hint="May be left out: the link is shown to you in any case. The address stays in the study's journal, and for 30 days with the administrators' messages."
        {...register("email")}
      />
      {seal.isError && <Fault>{sentenceOf(seal.error)}</Fault>}
      <div>
        <Button type="submit" filled disabled={seal.isPending}>
          {seal.isPending ? "Sealing" : "Seal a referee copy"}
        </Button>
      </div>
    </form>
  );
}

interface ChoiceProps extends React.ComponentProps<"select"> {
  readonly label: string;
  readonly children: ReactNode;
}

function Choice({ label, children, ...rest }: ChoiceProps) {
  const id = useId();
  return (
    <div>
      <label htmlFor={id} className="type-small block pb-1 text-ink2">
        {label}
      </label>
      <select id={id} className="field" {...rest}>
        {children}
      </select>
    </div>
  );
}
