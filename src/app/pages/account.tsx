import { lazy, type ReactNode, useState, useSyncExternalStore } from "react";
import type { OwnAccount } from "../../../shared/schemas/accounts.ts";
import { Button } from "../../components/button.tsx";
import { Fault } from "../../components/field.tsx";
import { useOwnAccount } from "../../features/accounts/api/own-account.ts";
import { FormatsChoice } from "../../features/accounts/formats-choice.tsx";
import { OwnAddressForm } from "../../features/accounts/own-address-form.tsx";
import { OwnData } from "../../features/accounts/own-data.tsx";
import { OwnNameForm } from "../../features/accounts/own-name-form.tsx";
import { OwnPassphraseForm } from "../../features/accounts/own-passphrase-form.tsx";
import { SessionList } from "../../features/accounts/session-list.tsx";
import { sentenceOf } from "../../lib/api.ts";
import { dateInWords } from "../../lib/dates.ts";
import { formatChoice, onFormatsChange } from "../../lib/formats.ts";
import { usePageTitle } from "../../lib/page-title.ts";
import { LaidOver } from "../laid-over.tsx";
import { OwnBar } from "../own-bar.tsx";
import { useForget } from "../use-leave.ts";

const RemoveAccountDialog = lazy(() => import("../../features/accounts/remove-account-dialog.tsx"));

/** One's own account: who one is here, where one is signed in, what is kept. */
export default function AccountPage() {
  const { data: account, error } = useOwnAccount();
  const [removing, setRemoving] = useState(false);
  const forget = useForget(account?.id);
  // Every date on the page follows a choice that is made on it.
  useSyncExternalStore(onFormatsChange, formatChoice);
  usePageTitle("Your account");
  return (
    <>
      <OwnBar />
      <main className="studies">
        <div className="studies-left">
          <h1 className="type-display own-title">Your account</h1>
          {account && <p className="type-finding pt-2">There since {dateInWords(account.since)}.</p>}
        </div>
        <div className="studies-right">
          {error && !account && <Fault>{sentenceOf(error)}</Fault>}
          {!account && !error && <p role="status">Fetching the account</p>}
          {account && <Parts account={account} onRemove={() => setRemoving(true)} />}
        </div>
      </main>
      {removing && account && (
        <LaidOver onClose={() => setRemoving(false)}>
          <RemoveAccountDialog account={account} onClose={() => setRemoving(false)} onRemoved={forget} />
        </LaidOver>
      )}
    </>
  );
}

function Parts({ account, onRemove }: { account: OwnAccount; onRemove: () => void }) {
  return (
    <>
      <Part title="Name">
        <OwnNameForm key={account.name} name={account.name} />
      </Part>
      <Part title="Address">
        <OwnAddressForm key={account.email} email={account.email} isConfirmed={account.isConfirmed} />
      </Part>
      <Part title="Passphrase">
        <OwnPassphraseForm />
      </Part>
      <Part title="Where you are signed in">
        <SessionList sessions={account.sessions} />
      </Part>
      <Part title="Dates and numbers">
        <FormatsChoice />
      </Part>
      <Part title="What is kept of you">
        <OwnData />
      </Part>
      <Part title="Delete the account">
        <Button onClick={onRemove}>Delete the account</Button>
      </Part>
    </>
  );
}

function Part({ title, children }: { title: string; children: ReactNode }) {
  return (
    <section aria-label={title} className="account-part">
      <h2 className="type-section">{title}</h2>
      <div className="min-w-0">{children}</div>
    </section>
  );
}
