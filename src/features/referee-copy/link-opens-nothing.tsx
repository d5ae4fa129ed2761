import { Button } from "../../components/button.tsx";
import { Mark } from "../../components/mark.tsx";

/** A wrong link and a revoked one say the same, and neither says which it is; an installation that fails says that. */
export function LinkOpensNothing({ because, onAgain }: { because?: string; onAgain?: () => void }) {
  return (
    <main className="mx-auto max-w-xl px-4.5 py-16">
      <Mark size={32} />
      <h1 className="type-title mt-6 mb-3">{because ? "The copy could not be fetched" : "This link opens nothing"}</h1>
      <p className="type-prose">{because ?? "Check that it is complete, or ask whoever sent it to you."}</p>
      {onAgain && (
        <Button className="mt-5" onClick={onAgain}>
          Try again
        </Button>
      )}
    </main>
  );
}
