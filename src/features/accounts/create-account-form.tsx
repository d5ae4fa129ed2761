import { zodResolver } from "@hookform/resolvers/zod";
import { useForm } from "react-hook-form";
import { Button } from "../../components/button.tsx";
import { Fault, Field } from "../../components/field.tsx";
import { sentenceOf } from "../../lib/api.ts";
import { type SignUpForm as Fields, signUpForm, useSignUp } from "./api/sign-up.ts";
import { PassphraseField } from "./passphrase-field.tsx";

export function CreateAccountForm({ onSignedIn }: { onSignedIn: () => void }) {
  const signUp = useSignUp();
  const { register, handleSubmit, formState } = useForm<Fields>({ resolver: zodResolver(signUpForm) });
  const create = (fields: Fields) => signUp.mutate(fields, { onSuccess: onSignedIn });
  const { errors } = formState;
  return (
    <form noValidate onSubmit={handleSubmit(create)} className="grid gap-5">
      <Field label="Name" autoComplete="name" fault={errors.name?.message} {...register("name")} />
      <Field label="Email" type="email" autoComplete="username" fault={errors.email?.message} {...register("email")} />
      <PassphraseField
        autoComplete="new-password"
        hint="At least 10 characters. A few words together are easier to keep than signs."
        fault={errors.password?.message}
        {...register("password")}
      />
      {signUp.isError && <Fault>{sentenceOf(signUp.error)}</Fault>}
      <div className="pt-1">
        <Button type="submit" filled disabled={signUp.isPending} className="min-h-10.5!">
          {signUp.isPending ? "Creating the account" : "Create the account"}
        </Button>
      </div>
    </form>
  );
}
