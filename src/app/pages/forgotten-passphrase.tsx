import { LinkWord } from "../../components/button.tsx";
import { ForgottenForm } from "../../features/accounts/forgotten-form.tsx";
import { usePageTitle } from "../../lib/page-title.ts";
import { pages } from "../../lib/paths.ts";
import { Door } from "../door.tsx";

export default function ForgottenPassphrasePage() {
  usePageTitle("Forgotten passphrase");
  return (
    <Door title="Forgotten passphrase">
      <ForgottenForm />
      <p className="pt-5 text-ink2">
        Found it again? <LinkWord to={pages.signIn}>Sign in</LinkWord>
      </p>
    </Door>
  );
}
