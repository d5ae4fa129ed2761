import { zodResolver } from "@hookform/resolvers/zod";
import { useId } from "react";
import { useForm } from "react-hook-form";
import { z } from "zod";
import { role } from "../../../shared/schemas/resources.ts";
import { Button } from "../../components/button.tsx";
import { Fault, Field } from "../../components/field.tsx";
import { sentenceOf } from "../../lib/api.ts";
import { useInvite } from "./api/invitations.ts";
import { ROLE_WORDS } from "./roles.ts";

const form = z.object({ email: z.email("An e-mail address looks like name@place.example."), role });
type Form = z.infer<typeof form>;

/** Invites an address by mail; whether it has an account is between it and the installation. */
export function InviteForm({ studyId }: { studyId: string }) {
  const id = useId();
  const invite = useInvite(studyId);
  const { register, handleSubmit, reset, formState } = useForm<Form>({
    resolver: zodResolver(form),
    defaultValues: { email: "", role: "coauthor" },
  });
  return (
    <form
      noValidate
      className="pt-6"
      onSubmit={handleSubmit((wanted) => invite.mutate(wanted, { onSuccess: () => reset() }))}
    >
      <h3 className="type-section pb-3">Invite someone</h3>
      <div className="grid items-start gap-4 sm:grid-cols-[minmax(0,1fr)_9rem_auto]">
        <Field
          label="Email"
          type="email"
          autoComplete="off"
          fault={formState.errors.email?.message}
          {...register("email")}
        />
        <div>
          <label htmlFor={id} className="type-small block pb-1 text-ink2">
            As
          </label>
          <select id={id} className="field" {...register("role")}>
            {Object.entries(ROLE_WORDS).map(([value, words]) => (
              <option key={value} value={value}>
                {words}
              </option>
            ))}
          </select>
        </div>
        <Button type="submit" disabled={invite.isPending} className="min-h-[2.625rem] self-start sm:mt-[1.375rem]">
          Invite
        </Button>
      </div>
      {invite.isError && <Fault>{sentenceOf(invite.error)}</Fault>}
      {invite.isSuccess && (
        <p role="status" className="type-small pt-2 text-ink2">
          A message is on its way to {invite.data.email}.
        </p>
      )}
    </form>
  );
}
