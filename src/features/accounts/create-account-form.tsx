import { zodResolver } from "@hookform/resolvers/zod";
import { useForm } from "react-hook-form";
import { z } from "zod";
import { Button } from "../../components/button.tsx";
import { Fault, Field } from "../../components/field.tsx";
import { sentenceOf } from "../../lib/api.ts";
import { nameField, passphraseField } from "./api/account-forms.ts";
import { PassphraseField } from "./passphrase-field.tsx";

const form = z.object({ name: nameField, password: passphraseField });
type Fields = z.infer<typeof form>;

interface CreateAccountFormProps {
  /** Theirs who follow the link; it is not theirs to change here. */
  readonly email: string;
  readonly words: string;
  readonly isPending: boolean;
  readonly error: unknown;
  readonly onCreate: (fields: Fields) => void;
}

/** Name and passphrase of an account whose address is known. */
export function CreateAccountForm({ email, words, isPending, error, onCreate }: CreateAccountFormProps) {
  const { register, handleSubmit, formState } = useForm<Fields>({ resolver: zodResolver(form) });
  const { errors } = formState;
  return (
    <form noValidate onSubmit={handleSubmit(onCreate)} className="grid gap-5">
      <Field label="Email" type="email" autoComplete="username" value={email} readOnly />
      <Field label="Name" autoComplete="name" fault={errors.name?.message} {...register("name")} />
      <PassphraseField
        autoComplete="new-password"
        hint="At least 10 characters. A few words together are easier to keep than signs."
        fault={errors.password?.message}
        {...register("password")}
      />
      {error != null && <Fault>{sentenceOf(error)}</Fault>}
      <div className="pt-1">
        <Button type="submit" filled disabled={isPending} className="min-h-10.5!">
          {isPending ? "Creating the account" : words}
        </Button>
      </div>
    </form>
  );
}
