import { type ComponentProps, createContext, memo, type ReactNode, useContext, useId } from "react";
import Markdown, { type Components, type Options } from "react-markdown";
import remarkGfm from "remark-gfm";
import type { QuotedNumber as QuotedNumberOfText, TextFinding } from "../../../shared/schemas/text.ts";
import { TableScroller } from "../../components/table-scroller.tsx";
import { headsInOrder, marksInTextOnly, noDeeper, proseOnly, quotationsInPlace, safeAddress } from "./markdown.ts";
import { shallow, withMarks } from "./marked-text.ts";
import { Quotation } from "./quotation.tsx";

/** What reads and draws mathematics, where a text has any. */
export interface Mathematics {
  readonly read: NonNullable<Options["remarkPlugins"]>;
  readonly draw: NonNullable<Options["rehypePlugins"]>;
}

export interface ProseProps {
  readonly finding: TextFinding;
  readonly mathematics?: Mathematics;
}

const NO_MATHEMATICS: Mathematics = { read: [], draw: [] };

/** A text as it reads: Markdown with tables and notes, its numbers in their places. No HTML, no pictures. */
export const Prose = memo(function Prose({ finding, mathematics = NO_MATHEMATICS }: ProseProps) {
  const { text, quotations } = finding;
  const prefix = `text-${useId().replace(/[^a-zA-Z0-9]/g, "")}-`;
  return (
    <div className="prose-text type-prose">
      <Quotations value={quotations}>
        <Markdown
          remarkPlugins={[
            proseOnly,
            [remarkGfm, { singleTilde: false }],
            ...mathematics.read,
            noDeeper,
            [marksInTextOnly, { text, quotations }],
          ]}
          rehypePlugins={[...mathematics.draw, headsInOrder, [quotationsInPlace, { quotations, prefix }]]}
          remarkRehypeOptions={{
            clobberPrefix: prefix,
            footnoteLabel: "Notes",
            // As a first heading of the text would: two levels down, below the cell's name.
            footnoteLabelTagName: "h1",
            footnoteBackLabel: (place: number) => `Back to where note ${place + 1} stands`,
          }}
          urlTransform={safeAddress}
          components={ELEMENTS}
        >
          {shallow(withMarks(text, quotations))}
        </Markdown>
      </Quotations>
    </div>
  );
});

/** A quotation's place among those of the text that is being drawn. */
function QuotedNumber({ place }: { place?: number | string }) {
  const quotation = useContext(Quotations)[Number(place)];
  return quotation ? <Quotation quotation={quotation} /> : null;
}

const Quotations = createContext<readonly QuotedNumberOfText[]>([]);

interface Within {
  readonly children?: ReactNode;
}

/** Below the study and the cell, so that a text's own heads begin at the third level. */
function head(level: 3 | 4 | 5 | 6) {
  const Head = `h${level}` as const;
  return ({ children, id }: { children?: ReactNode; id?: string }) => (
    <Head id={id} className={level === 3 ? "type-section" : "prose-head"}>
      {children}
    </Head>
  );
}

function ProseLink({ href, children, node: _, ...rest }: ComponentProps<"a"> & { node?: unknown }) {
  if (!href) return <span>{children}</span>;
  if (href.startsWith("#")) {
    return (
      <a {...rest} href={href}>
        {children}
      </a>
    );
  }
  return (
    <a className="reference" href={href} rel="noopener noreferrer nofollow" target="_blank">
      {children}
    </a>
  );
}

const ELEMENTS = {
  "quoted-number": QuotedNumber,
  a: ProseLink,
  // Nothing is fetched from elsewhere: what a picture shows is said in its words.
  img: ({ alt }: { alt?: string }) => <span className="text-ink2">{alt ? `(picture: ${alt})` : "(picture)"}</span>,
  table: ({ children }: Within) => (
    <TableScroller label="Table of the text">
      <table className="prose-table type-table">{children}</table>
    </TableScroller>
  ),
  pre: ({ children }: Within) => (
    // biome-ignore lint/a11y/noNoninteractiveTabindex: what scrolls sideways can be reached by keyboard
    <pre className="type-source" tabIndex={0}>
      {children}
    </pre>
  ),
  h1: head(3),
  h2: head(4),
  h3: head(5),
  h4: head(6),
  h5: head(6),
  h6: head(6),
} as Components;
