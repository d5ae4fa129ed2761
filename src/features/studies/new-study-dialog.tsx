import { zodResolver } from "@hookform/resolvers/zod";
import { useForm } from "react-hook-form";
import { Button } from "../../components/button.tsx";
import { Dialog } from "../../components/dialog.tsx";
import { Fault, Field } from "../../components/field.tsx";
import { LongField } from "../../components/long-field.tsx";
import { sentenceOf } from "../../lib/api.ts";
import { type NewStudyForm, newStudyForm, useCreateStudy } from "./api/create-study.ts";

interface NewStudyDialogProps {
  readonly onClose: () => void;
  readonly onCreated: (studyId: string) => void;
}

export default function NewStudyDialog({ onClose, onCreated }: NewStudyDialogProps) {
  return (
    <Dialog onClose={onClose} title="New study" lede="You own it; people are added once it is there.">
      <NewStudy onCreated={onCreated} />
    </Dialog>
  );
}

function NewStudy({ onCreated }: Pick<NewStudyDialogProps, "onCreated">) {
  const create = useCreateStudy();
  const { register, handleSubmit, formState } = useForm<NewStudyForm>({
    resolver: zodResolver(newStudyForm),
    defaultValues: { title: "", lede: "" },
  });
  return (
    <form
      noValidate
      className="grid gap-5"
      onSubmit={handleSubmit((form) => create.mutate(form, { onSuccess: ({ id }) => onCreated(id) }))}
    >
      <Field label="Title" fault={formState.errors.title?.message} {...register("title")} />
      <LongField
        label="What it asks, in a sentence"
        hint="May be left for later."
        fault={formState.errors.lede?.message}
        {...register("lede")}
      />
      {create.isError && <Fault>{sentenceOf(create.error)}</Fault>}
      <div>
        <Button type="submit" filled disabled={create.isPending}>
          {create.isPending ? "Making the study" : "Make the study"}
        </Button>
      </div>
    </form>
  );
}
