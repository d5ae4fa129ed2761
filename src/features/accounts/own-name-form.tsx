import { zodResolver } from "@hookform/resolvers/zod";
import { useForm } from "react-hook-form";
import { z } from "zod";
import { Button } from "../../components/button.tsx";
import { Fault, Field } from "../../components/field.tsx";
import { sentenceOf } from "../../lib/api.ts";
import { nameField } from "./api/account-forms.ts";
import { useRename } from "./api/own-account.ts";

const form = z.object({ name: nameField });

/** As coauthors see it beside what one writes. */
export function OwnNameForm({ name }: { name: string }) {
  const rename = useRename();
  const { register, handleSubmit, formState } = useForm<z.infer<typeof form>>({
    resolver: zodResolver(form),
    defaultValues: { name },
  });
  return (
    <form noValidate className="account-form" onSubmit={handleSubmit((fields) => rename.mutate(fields))}>
      <Field label="Name" autoComplete="name" fault={formState.errors.name?.message} {...register("name")} />
      <Button type="submit" disabled={rename.isPending}>
        Keep the name
      </Button>
      {rename.isError && <Fault>{sentenceOf(rename.error)}</Fault>}
      {rename.isSuccess && (
        <p role="status" className="type-small text-ink2">
          Kept. Studies that are open show it when they are opened again.
        </p>
      )}
    </form>
  );
}
