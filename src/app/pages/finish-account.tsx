import { useNavigate, useParams } from "react-router-dom";
import { useAccountLink, useFinishAccount } from "../../features/accounts/api/account-link.ts";
import { CreateAccountForm } from "../../features/accounts/create-account-form.tsx";
import { usePageTitle } from "../../lib/page-title.ts";
import { pages } from "../../lib/paths.ts";
import { Door } from "../door.tsx";
import { LinkFault } from "../link-fault.tsx";

/** Behind the link that was sent to an address: name and passphrase, and the account is there. */
export default function FinishAccountPage() {
  const { token = "" } = useParams();
  const { data: link, error } = useAccountLink(token);
  const finish = useFinishAccount(token);
  const navigate = useNavigate();
  usePageTitle("Create an account");
  return (
    <Door title="Create an account">
      {error && <LinkFault error={error} again={{ to: pages.createAccount, words: "Ask for another link" }} />}
      {link && (
        <CreateAccountForm
          email={link.email}
          words="Create the account"
          isPending={finish.isPending}
          error={finish.error}
          onCreate={(fields) => finish.mutate(fields, { onSuccess: () => navigate(pages.studies, { replace: true }) })}
        />
      )}
      {!link && !error && <p role="status">Opening the link</p>}
    </Door>
  );
}
