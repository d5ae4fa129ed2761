import type { SessionSummary } from "../../../shared/schemas/accounts.ts";
import { Button, Word } from "../../components/button.tsx";
import { Fault } from "../../components/field.tsx";
import { sentenceOf } from "../../lib/api.ts";
import { agoInWords } from "../../lib/dates.ts";
import { useEndSession } from "./api/own-account.ts";

/** Where one is signed in. A session that ends is out at once, its open studies too. */
export function SessionList({ sessions }: { sessions: readonly SessionSummary[] }) {
  const end = useEndSession();
  const others = sessions.filter(({ isThis }) => !isThis);
  return (
    <>
      <ul className="border-rule2 border-b">
        {sessions.map((session) => (
          <li
            key={session.id}
            className="grid grid-cols-[minmax(0,1fr)_auto] items-baseline gap-x-6 border-rule2 border-t py-2.5"
          >
            <div className="min-w-0">
              <p className="font-semibold">
                {session.browser} {session.isThis && <span className="font-normal text-ink2">this one</span>}
              </p>
              <p className="type-small text-ink2">
                {session.address && `From ${session.address}. `}Signed in {agoInWords(session.since)}, last used{" "}
                {agoInWords(session.lastUsed)}.
              </p>
            </div>
            {!session.isThis && (
              <Word disabled={end.isPending} onClick={() => end.mutate(session.id)}>
                End <span className="sr-only">{session.browser}</span>
              </Word>
            )}
          </li>
        ))}
      </ul>
      {end.isError && <Fault>{sentenceOf(end.error)}</Fault>}
      {others.length > 1 && (
        <div className="pt-4">
          <Button disabled={end.isPending} onClick={() => end.mutate("all others")}>
            End all {others.length} others
          </Button>
        </div>
      )}
    </>
  );
}
