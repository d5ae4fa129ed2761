import { useLocation } from "react-router-dom";
import { LinkWord } from "../../components/button.tsx";
import { AskAccountForm } from "../../features/accounts/ask-account-form.tsx";
import { usePageTitle } from "../../lib/page-title.ts";
import { pages } from "../../lib/paths.ts";
import { Door } from "../door.tsx";

export default function CreateAccountPage() {
  const { search } = useLocation();
  usePageTitle("Create an account");
  return (
    <Door title="Create an account">
      <AskAccountForm />
      <p className="pt-5 text-ink2">
        An account already? <LinkWord to={`${pages.signIn}${search}`}>Sign in</LinkWord>
      </p>
    </Door>
  );
}
