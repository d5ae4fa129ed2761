import { Button } from "../../components/button.tsx";
import { Fault } from "../../components/field.tsx";
import { sentenceOf } from "../../lib/api.ts";
import { useSaveOwnData } from "./api/own-account.ts";

/** What is kept of a person, in a sentence, and all of it as a file. */
export function OwnData() {
  const save = useSaveOwnData();
  return (
    <div className="grid max-w-[38rem] justify-items-start gap-3">
      <p className="type-prose">
        Your name, your address, your passphrase in a form that cannot be read back, and for each session the browser,
        the network address and the times. In studies: who wrote, uploaded, remarked and sealed what, and when. All of
        it lies in this installation's own database and goes nowhere else.
      </p>
      <Button disabled={save.isPending} onClick={() => save.mutate()}>
        {save.isPending ? "Gathering it" : "Save all of it as a file"}
      </Button>
      <p className="type-small text-ink2">
        One JSON file: your account, sessions, messages to you, memberships, remarks, uploads, checkpoints, what you did
        and when. No passphrase, no links, nothing that others wrote. The file is about you: mind where you keep it.
      </p>
      {save.isError && <Fault>{sentenceOf(save.error)}</Fault>}
      {save.isSuccess && (
        <p role="status" className="type-small text-ink2">
          Handed to the browser as {save.data}.
        </p>
      )}
    </div>
  );
}
