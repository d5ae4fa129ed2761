import { zodResolver } from "@hookform/resolvers/zod";
import { useForm } from "react-hook-form";
import { z } from "zod";
import type { OwnAccount } from "../../../shared/schemas/accounts.ts";
import { counted } from "../../../shared/study/words.ts";
import { Button, LinkWord } from "../../components/button.tsx";
import { Dialog } from "../../components/dialog.tsx";
import { Fault } from "../../components/field.tsx";
import { sentenceOf } from "../../lib/api.ts";
import { pages } from "../../lib/paths.ts";
import { knownPassphraseField } from "./api/account-forms.ts";
import { useRemoveAccount } from "./api/own-account.ts";
import { PassphraseField } from "./passphrase-field.tsx";

interface RemoveAccountDialogProps {
  readonly account: OwnAccount;
  readonly onClose: () => void;
  readonly onRemoved: () => void;
}

const form = z.object({ password: knownPassphraseField });

/** The account goes; a study with others in it has to have another owner first. */
export default function RemoveAccountDialog({ account, onClose, onRemoved }: RemoveAccountDialogProps) {
  const { toHandOver, alone } = account;
  if (toHandOver.length > 0) {
    return (
      <Dialog
        onClose={onClose}
        title="Delete the account"
        lede="First hand over the studies that you alone own and that others are in: People, in the study's own menu."
      >
        <ul className="border-rule2 border-b">
          {toHandOver.map(({ studyId, title, others }) => (
            <li key={studyId} className="flex flex-wrap justify-between gap-x-6 border-rule2 border-t py-2">
              <LinkWord to={pages.study(studyId)}>{title}</LinkWord>
              <span className="text-ink2">{counted(others, "other")} in it</span>
            </li>
          ))}
        </ul>
      </Dialog>
    );
  }
  const gone =
    alone.length === 0
      ? ""
      : ` ${alone.map(({ title }) => title).join(", ")}: with nobody else in it, goes too, at once.`;
  return (
    <Dialog
      onClose={onClose}
      title="Delete the account"
      lede={`Your name and address go, and you are out of every study. What you wrote in studies of others stays, without your name.${gone} There is no way back.`}
    >
      <RemoveForm onClose={onClose} onRemoved={onRemoved} />
    </Dialog>
  );
}

function RemoveForm({ onClose, onRemoved }: Omit<RemoveAccountDialogProps, "account">) {
  const remove = useRemoveAccount();
  const { register, handleSubmit, formState } = useForm<z.infer<typeof form>>({ resolver: zodResolver(form) });
  return (
    <form
      noValidate
      className="grid gap-4"
      onSubmit={handleSubmit((fields) => remove.mutate(fields, { onSuccess: onRemoved }))}
    >
      <PassphraseField
        autoComplete="current-password"
        fault={formState.errors.password?.message}
        {...register("password")}
      />
      {remove.isError && <Fault>{sentenceOf(remove.error)}</Fault>}
      <div className="flex flex-wrap gap-4">
        <Button filled onClick={onClose}>
          Keep it
        </Button>
        <Button type="submit" disabled={remove.isPending}>
          Delete the account
        </Button>
      </div>
    </form>
  );
}
