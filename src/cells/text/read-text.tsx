import { Component, lazy, type ReactNode, Suspense } from "react";
import type { TextFinding } from "../../../shared/schemas/text.ts";
import { quotationInWords } from "../../../shared/tables/text-finding.ts";
import { Prose } from "./prose.tsx";

/** Only a text with a dollar sign can have mathematics: the others do not wait for its type. */
const ProseWithMathematics = lazy(() => import("./prose-with-mathematics.tsx"));

/** A text with its numbers; until it can be drawn, or where it cannot, its own letters with the numbers among them. */
export function ReadText({ finding }: { finding: TextFinding }) {
  const letters = <Letters finding={finding} />;
  return (
    <WhereUnreadable key={finding.text} instead={letters}>
      {finding.text.includes("$") ? (
        <Suspense fallback={letters}>
          <ProseWithMathematics finding={finding} />
        </Suspense>
      ) : (
        <Prose finding={finding} />
      )}
    </WhereUnreadable>
  );
}

function Letters({ finding: { text, quotations } }: { finding: TextFinding }) {
  const words = quotations.reduceRight(
    (told, one) => told.slice(0, one.from) + quotationInWords(one) + told.slice(one.to),
    text,
  );
  return <p className="type-prose whitespace-pre-wrap">{words}</p>;
}

interface Instead {
  readonly instead: ReactNode;
  readonly children: ReactNode;
}

/** A text that no reader of Markdown can follow takes nothing else of the page with it. */
class WhereUnreadable extends Component<Instead, { readonly failed: boolean }> {
  override state = { failed: false };

  static getDerivedStateFromError() {
    return { failed: true };
  }

  override render() {
    return this.state.failed ? this.props.instead : this.props.children;
  }
}
