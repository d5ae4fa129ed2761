import { useState } from "react";
import { useParams } from "react-router-dom";
import { LinkButton, LinkWord } from "../../components/button.tsx";
import { ResetForm } from "../../features/accounts/reset-form.tsx";
import { usePageTitle } from "../../lib/page-title.ts";
import { pages } from "../../lib/paths.ts";
import { Door } from "../door.tsx";

/** Behind the link that was sent to an address: a new passphrase. */
export default function ResetPassphrasePage() {
  const { token = "" } = useParams();
  const [isSet, setIsSet] = useState(false);
  usePageTitle("Set a new passphrase");
  return (
    <Door title="Set a new passphrase">
      {isSet ? (
        <div role="status">
          <p className="type-finding pb-5">The new passphrase is set, and every session that was open has ended.</p>
          <LinkButton filled to={pages.signIn}>
            Sign in
          </LinkButton>
        </div>
      ) : (
        <>
          <ResetForm token={token} onReset={() => setIsSet(true)} />
          <p className="pt-5 text-ink2">
            Has the link run out? <LinkWord to={pages.forgottenPassphrase}>Ask for another</LinkWord>
          </p>
        </>
      )}
    </Door>
  );
}
