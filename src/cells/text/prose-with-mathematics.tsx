import "katex/dist/katex.min.css";
import rehypeKatex from "rehype-katex";
import remarkMath from "remark-math";
import { type Mathematics, Prose, type ProseProps } from "./prose.tsx";

/**
 * Formulae as boxes of type and, for whoever hears the page, as MathML. Nothing in a formula may lead anywhere, load
 * anything or grow without bound; what cannot be read stands as it was written, in the colour of failure.
 */
const MATHEMATICS: Mathematics = {
  read: [remarkMath],
  draw: [
    [
      rehypeKatex,
      {
        output: "htmlAndMathml",
        trust: false,
        strict: "ignore",
        throwOnError: false,
        errorColor: "var(--fail)",
        maxSize: 20,
        maxExpand: 200,
      },
    ],
  ],
};

export default function ProseWithMathematics(props: ProseProps) {
  return <Prose {...props} mathematics={MATHEMATICS} />;
}
