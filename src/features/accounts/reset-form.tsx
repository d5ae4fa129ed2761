import { zodResolver } from "@hookform/resolvers/zod";
import { useForm } from "react-hook-form";
import { z } from "zod";
import { Button } from "../../components/button.tsx";
import { Fault } from "../../components/field.tsx";
import { sentenceOf } from "../../lib/api.ts";
import { passphraseField } from "./api/account-forms.ts";
import { useResetPassphrase } from "./api/passphrase.ts";
import { PassphraseField } from "./passphrase-field.tsx";

const form = z.object({ newPassword: passphraseField });

export function ResetForm({ token, onReset }: { token: string; onReset: () => void }) {
  const reset = useResetPassphrase();
  const { register, handleSubmit, formState } = useForm<z.infer<typeof form>>({ resolver: zodResolver(form) });
  const set = ({ newPassword }: z.infer<typeof form>) => reset.mutate({ token, newPassword }, { onSuccess: onReset });
  return (
    <form noValidate onSubmit={handleSubmit(set)} className="grid gap-5">
      <PassphraseField
        label="New passphrase"
        autoComplete="new-password"
        hint="At least 10 characters. Every session that is open ends."
        fault={formState.errors.newPassword?.message}
        {...register("newPassword")}
      />
      {reset.isError && <Fault>{sentenceOf(reset.error)}</Fault>}
      <div className="pt-1">
        <Button type="submit" filled disabled={reset.isPending} className="min-h-10.5!">
          {reset.isPending ? "Setting it" : "Set the passphrase"}
        </Button>
      </div>
    </form>
  );
}
