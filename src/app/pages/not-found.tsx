import { LinkWord } from "../../components/button.tsx";
import { pages } from "../../lib/paths.ts";
import { PlainPage } from "../plain-page.tsx";

export default function NotFoundPage() {
  return (
    <PlainPage title="Nothing is at this address">
      <p className="type-prose">
        The address may have been cut short on its way. Your work is among the{" "}
        <LinkWord to={pages.studies}>studies</LinkWord>.
      </p>
    </PlainPage>
  );
}
