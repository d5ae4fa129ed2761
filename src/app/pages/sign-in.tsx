import { useLocation, useNavigate } from "react-router-dom";
import { LinkWord } from "../../components/button.tsx";
import { SignInForm } from "../../features/accounts/sign-in-form.tsx";
import { usePageTitle } from "../../lib/page-title.ts";
import { pages } from "../../lib/paths.ts";
import { Door } from "../door.tsx";
import { destinationOf } from "../doorkeeper.ts";

export default function SignInPage() {
  const { search } = useLocation();
  const navigate = useNavigate();
  usePageTitle("Sign in");
  return (
    <Door title="Sign in">
      <SignInForm onSignedIn={() => navigate(destinationOf(search), { replace: true })} />
      <p className="type-small pt-4">
        <LinkWord quiet to={pages.forgottenPassphrase} className="reference">
          Forgotten passphrase
        </LinkWord>
      </p>
      <p className="pt-4 text-ink2">
        No account yet? <LinkWord to={`${pages.createAccount}${search}`}>Create an account</LinkWord>
      </p>
    </Door>
  );
}
