import { useRouteError } from "react-router-dom";
import { Button, LinkWord } from "../components/button.tsx";
import { sentenceOf } from "../lib/api.ts";
import { pages } from "../lib/paths.ts";
import { PlainPage } from "./plain-page.tsx";

/** When a page could not be shown at all. */
export function PageFault() {
  const error = useRouteError();
  return (
    <PlainPage title="This page could not be opened">
      <p className="type-prose">{sentenceOf(error)}</p>
      <p className="flex items-center gap-5 pt-5">
        <Button filled onClick={() => location.reload()}>
          Load it again
        </Button>
        <LinkWord to={pages.studies}>Studies</LinkWord>
      </p>
    </PlainPage>
  );
}
