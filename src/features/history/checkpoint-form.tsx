import { zodResolver } from "@hookform/resolvers/zod";
import { useForm } from "react-hook-form";
import { z } from "zod";
import { Button, Word } from "../../components/button.tsx";
import { Fault, Field } from "../../components/field.tsx";
import { LongField } from "../../components/long-field.tsx";

const form = z.object({
  name: z.string().trim().min(1, "A checkpoint needs a name.").max(120, "A name has at most 120 characters."),
  note: z.string().trim().max(2000, "A note has at most 2,000 characters."),
});
export type CheckpointWords = z.infer<typeof form>;

interface CheckpointFormProps {
  readonly words?: CheckpointWords;
  readonly action: string;
  readonly pending: boolean;
  /** What the server had against it. */
  readonly fault?: string;
  readonly onSubmit: (words: CheckpointWords) => void;
  readonly onLeave: () => void;
}

/** What a checkpoint is called, and why it was kept. */
export function CheckpointForm({ words, action, pending, fault, onSubmit, onLeave }: CheckpointFormProps) {
  const { register, handleSubmit, formState } = useForm<CheckpointWords>({
    resolver: zodResolver(form),
    defaultValues: words ?? { name: "", note: "" },
  });
  return (
    <form noValidate className="grid gap-3 pt-3" onSubmit={handleSubmit(onSubmit)}>
      <Field label="Name" autoComplete="off" autoFocus fault={formState.errors.name?.message} {...register("name")} />
      <LongField
        label="Note"
        rows={2}
        hint="May be left out."
        fault={formState.errors.note?.message}
        {...register("note")}
      />
      {fault && <Fault>{fault}</Fault>}
      <div className="flex items-center gap-5">
        <Button type="submit" disabled={pending}>
          {action}
        </Button>
        <Word quiet onClick={onLeave}>
          Leave it
        </Word>
      </div>
    </form>
  );
}
