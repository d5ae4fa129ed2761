import { zodResolver } from "@hookform/resolvers/zod";
import { useForm } from "react-hook-form";
import { z } from "zod";
import { Button } from "../../components/button.tsx";
import { Fault } from "../../components/field.tsx";
import { sentenceOf } from "../../lib/api.ts";
import { knownPassphraseField, passphraseField } from "./api/account-forms.ts";
import { useChangePassphrase } from "./api/passphrase.ts";
import { PassphraseField } from "./passphrase-field.tsx";

const form = z.object({ currentPassword: knownPassphraseField, newPassword: passphraseField });
type Fields = z.infer<typeof form>;

export function OwnPassphraseForm() {
  const change = useChangePassphrase();
  const { register, handleSubmit, reset, formState } = useForm<Fields>({
    resolver: zodResolver(form),
    defaultValues: { currentPassword: "", newPassword: "" },
  });
  const { errors } = formState;
  return (
    <form
      noValidate
      className="grid max-w-[27rem] gap-4"
      onSubmit={handleSubmit((fields) => change.mutate(fields, { onSuccess: () => reset() }))}
    >
      <PassphraseField
        label="Present passphrase"
        autoComplete="current-password"
        fault={errors.currentPassword?.message}
        {...register("currentPassword")}
      />
      <PassphraseField
        label="New passphrase"
        autoComplete="new-password"
        hint="At least 10 characters. Every other session ends."
        fault={errors.newPassword?.message}
        {...register("newPassword")}
      />
      {change.isError && <Fault>{sentenceOf(change.error)}</Fault>}
      <div>
        <Button type="submit" disabled={change.isPending}>
          Change the passphrase
        </Button>
      </div>
      {change.isSuccess && (
        <p role="status" className="type-small text-ink2">
          Changed. Every other session has ended.
        </p>
      )}
    </form>
  );
}
