import { zodResolver } from "@hookform/resolvers/zod";
import { useForm } from "react-hook-form";
import { z } from "zod";
import { Button } from "../../components/button.tsx";
import { Fault, Field } from "../../components/field.tsx";
import { sentenceOf } from "../../lib/api.ts";
import { emailField } from "./api/account-forms.ts";
import { useAskAccount } from "./api/ask-account.ts";
import { LinkSent } from "./link-sent.tsx";

const form = z.object({ email: emailField });

/** An account begins with its address: the rest is asked for behind the link that is sent to it. */
export function AskAccountForm() {
  const askFor = useAskAccount();
  const { register, handleSubmit, formState } = useForm<z.infer<typeof form>>({ resolver: zodResolver(form) });
  if (askFor.isSuccess) {
    return <LinkSent email={askFor.variables.email} what="Its link opens for one day, and makes the account." />;
  }
  return (
    <form noValidate onSubmit={handleSubmit((fields) => askFor.mutate(fields))} className="grid gap-5">
      <Field
        label="Email"
        type="email"
        autoComplete="username"
        hint="A link is sent to it, to make the account with."
        fault={formState.errors.email?.message}
        {...register("email")}
      />
      {askFor.isError && <Fault>{sentenceOf(askFor.error)}</Fault>}
      <div className="pt-1">
        <Button type="submit" filled disabled={askFor.isPending} className="min-h-10.5!">
          {askFor.isPending ? "Sending the link" : "Send the link"}
        </Button>
      </div>
    </form>
  );
}
