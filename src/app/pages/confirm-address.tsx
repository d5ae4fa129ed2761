import { useParams } from "react-router-dom";
import { Button, LinkButton } from "../../components/button.tsx";
import { useConfirmAddress } from "../../features/accounts/api/account-link.ts";
import { usePageTitle } from "../../lib/page-title.ts";
import { pages } from "../../lib/paths.ts";
import { Door } from "../door.tsx";
import { LinkFault } from "../link-fault.tsx";

/** Behind the link that was sent to the address an account is to have. A button, since mail programs open links unasked. */
export default function ConfirmAddressPage() {
  const { token = "" } = useParams();
  const confirm = useConfirmAddress(token);
  usePageTitle("Confirm an address");
  return (
    <Door title="Confirm an address">
      {confirm.isError ? (
        <LinkFault error={confirm.error} again={{ to: pages.account, words: "Your account" }} />
      ) : confirm.isSuccess ? (
        <div role="status">
          <p className="type-finding pb-5">You sign in as {confirm.data.email} from now on.</p>
          <LinkButton filled to={pages.studies}>
            To the studies
          </LinkButton>
        </div>
      ) : (
        <>
          <p className="type-finding pb-5">This is to be the address of your account.</p>
          <Button filled disabled={confirm.isPending} className="min-h-10.5!" onClick={() => confirm.mutate()}>
            {confirm.isPending ? "Confirming" : "Confirm the address"}
          </Button>
        </>
      )}
    </Door>
  );
}
