import { zodResolver } from "@hookform/resolvers/zod";
import { useForm } from "react-hook-form";
import { z } from "zod";
import { Button } from "../../components/button.tsx";
import { Fault, Field } from "../../components/field.tsx";
import { sentenceOf } from "../../lib/api.ts";
import { emailField } from "./api/account-forms.ts";
import { useAskReset } from "./api/passphrase.ts";
import { LinkSent } from "./link-sent.tsx";

const form = z.object({ email: emailField });

export function ForgottenForm() {
  const reset = useAskReset();
  const { register, handleSubmit, formState } = useForm<z.infer<typeof form>>({ resolver: zodResolver(form) });
  if (reset.isSuccess) {
    return (
      <LinkSent
        email={reset.variables.email}
        what="If an account has this address, its link opens for an hour, and sets a new passphrase."
      />
    );
  }
  return (
    <form noValidate onSubmit={handleSubmit((fields) => reset.mutate(fields))} className="grid gap-5">
      <Field
        label="Email"
        type="email"
        autoComplete="username"
        hint="A link is sent to it, to set a new passphrase with."
        fault={formState.errors.email?.message}
        {...register("email")}
      />
      {reset.isError && <Fault>{sentenceOf(reset.error)}</Fault>}
      <div className="pt-1">
        <Button type="submit" filled disabled={reset.isPending} className="min-h-10.5!">
          {reset.isPending ? "Sending the link" : "Send the link"}
        </Button>
      </div>
    </form>
  );
}
