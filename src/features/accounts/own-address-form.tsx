import { zodResolver } from "@hookform/resolvers/zod";
import { useForm } from "react-hook-form";
import { z } from "zod";
import { Button, Word } from "../../components/button.tsx";
import { Fault, Field } from "../../components/field.tsx";
import { sentenceOf } from "../../lib/api.ts";
import { emailField } from "./api/account-forms.ts";
import { useAskToMove } from "./api/own-account.ts";
import { LinkSent } from "./link-sent.tsx";

const form = z.object({ email: emailField });

/** The address one signs in with; another becomes it once a link sent there has been followed. */
export function OwnAddressForm({ email, isConfirmed }: { email: string; isConfirmed: boolean }) {
  const move = useAskToMove();
  const { register, handleSubmit, formState } = useForm<z.infer<typeof form>>({ resolver: zodResolver(form) });
  return (
    <>
      <p className="pb-4">
        You sign in as <span className="break-words font-semibold">{email}</span>.{" "}
        {!isConfirmed && (
          <>
            Nobody has confirmed yet that messages to it reach you:{" "}
            <Word disabled={move.isPending} onClick={() => move.mutate({ email })}>
              send a link
            </Word>
            .
          </>
        )}
      </p>
      {move.isSuccess ? (
        <LinkSent email={move.variables.email} what="Once its link is followed, you sign in with that address." />
      ) : (
        <form noValidate className="account-form" onSubmit={handleSubmit((fields) => move.mutate(fields))}>
          <Field
            label="Another address"
            type="email"
            autoComplete="off"
            fault={formState.errors.email?.message}
            {...register("email")}
          />
          <Button type="submit" disabled={move.isPending}>
            Send a link to it
          </Button>
          {move.isError && <Fault>{sentenceOf(move.error)}</Fault>}
        </form>
      )}
    </>
  );
}
