import { useLocation, useNavigate } from "react-router-dom";
import { LinkWord } from "../../components/button.tsx";
import { CreateAccountForm } from "../../features/accounts/create-account-form.tsx";
import { usePageTitle } from "../../lib/page-title.ts";
import { pages } from "../../lib/paths.ts";
import { Door } from "../door.tsx";
import { destinationOf } from "../doorkeeper.ts";

export default function CreateAccountPage() {
  const { search } = useLocation();
  const navigate = useNavigate();
  usePageTitle("Create an account");
  return (
    <Door title="Create an account">
      <CreateAccountForm onSignedIn={() => navigate(destinationOf(search), { replace: true })} />
      <p className="pt-5 text-ink2">
        An account already? <LinkWord to={`${pages.signIn}${search}`}>Sign in</LinkWord>
      </p>
    </Door>
  );
}
