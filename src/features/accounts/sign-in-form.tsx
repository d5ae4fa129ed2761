import { zodResolver } from "@hookform/resolvers/zod";
import { useForm } from "react-hook-form";
import { Button } from "../../components/button.tsx";
import { Fault, Field } from "../../components/field.tsx";
import { sentenceOf } from "../../lib/api.ts";
import { type SignInForm as Fields, signInForm, useSignIn } from "./api/sign-in.ts";
import { DemoSignIns } from "./demo-sign-ins.tsx";
import { PassphraseField } from "./passphrase-field.tsx";

export function SignInForm({ onSignedIn }: { onSignedIn: () => void }) {
  const signIn = useSignIn();
  const { register, handleSubmit, setValue, formState } = useForm<Fields>({ resolver: zodResolver(signInForm) });
  const enter = (fields: Fields) => signIn.mutate(fields, { onSuccess: onSignedIn });
  return (
    <>
      <form noValidate onSubmit={handleSubmit(enter)} className="grid gap-5">
        <Field
          label="Email"
          type="email"
          autoComplete="username"
          fault={formState.errors.email?.message}
          {...register("email")}
        />
        <PassphraseField
          autoComplete="current-password"
          fault={formState.errors.password?.message}
          {...register("password")}
        />
        {signIn.isError && <Fault>{sentenceOf(signIn.error)}</Fault>}
        <div className="pt-1">
          <Button type="submit" filled disabled={signIn.isPending} className="min-h-10.5! min-w-24">
            {signIn.isPending ? "Signing in" : "Sign in"}
          </Button>
        </div>
      </form>
      <DemoSignIns
        busy={signIn.isPending}
        onChoose={({ email, passphrase }) => {
          setValue("email", email);
          setValue("password", passphrase);
          enter({ email, password: passphrase });
        }}
      />
    </>
  );
}
