import { Button, LinkButton } from "../components/button.tsx";
import { TopBar } from "../components/top-bar.tsx";
import { useMe } from "../features/accounts/api/get-me.ts";
import { pages } from "../lib/paths.ts";
import { useLeave } from "./use-leave.ts";

const STUDIES = [{ to: pages.studies, words: "Studies" }];

/** The top bar of pages about oneself and the installation. */
export function OwnBar() {
  const { data: me } = useMe();
  const leave = useLeave(me?.id);
  return (
    <TopBar home={pages.studies} crumbs={STUDIES}>
      {me?.isAdministrator && <LinkButton to={pages.administration}>Administration</LinkButton>}
      <LinkButton to={pages.account}>{me?.name ?? "Your account"}</LinkButton>
      <Button onClick={leave}>Sign out</Button>
    </TopBar>
  );
}
