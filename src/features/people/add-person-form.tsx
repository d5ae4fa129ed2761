import { zodResolver } from "@hookform/resolvers/zod";
import { useId } from "react";
import { useForm } from "react-hook-form";
import { z } from "zod";
import { role } from "../../../shared/schemas/resources.ts";
import { Button } from "../../components/button.tsx";
import { Fault, Field } from "../../components/field.tsx";
import { sentenceOf } from "../../lib/api.ts";
import { useAddPerson } from "./api/change-people.ts";
import { ROLE_WORDS } from "./roles.ts";

const form = z.object({ email: z.email("An e-mail address looks like name@place.example."), role });
type Form = z.infer<typeof form>;

/** Adds someone who has an account on this installation, by the address they sign in with. */
export function AddPersonForm({ studyId }: { studyId: string }) {
  const id = useId();
  const add = useAddPerson(studyId);
  const { register, handleSubmit, reset, formState } = useForm<Form>({
    resolver: zodResolver(form),
    defaultValues: { email: "", role: "coauthor" },
  });
  return (
    <form
      noValidate
      className="pt-6"
      onSubmit={handleSubmit((wanted) => add.mutate(wanted, { onSuccess: () => reset() }))}
    >
      <h3 className="type-section pb-3">Add someone</h3>
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
        <Button type="submit" disabled={add.isPending} className="min-h-[2.625rem] self-start sm:mt-[1.375rem]">
          Add
        </Button>
      </div>
      {add.isError && <Fault>{sentenceOf(add.error)}</Fault>}
      {add.isSuccess && (
        <p role="status" className="type-small pt-2 text-ink2">
          {add.data.name} is in the study now, as {add.data.role}.
        </p>
      )}
    </form>
  );
}
