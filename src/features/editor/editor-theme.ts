import { HighlightStyle, syntaxHighlighting } from "@codemirror/language";
import type { Extension } from "@codemirror/state";
import { EditorView } from "@codemirror/view";
import { tags } from "@lezer/highlight";

/** The editor in the page's own type and colours: no gutter, no line numbers, nothing but the text. */
const page = EditorView.theme({
  "&": { backgroundColor: "transparent", color: "var(--ink)" },
  "&.cm-focused": { outline: "none" },
  ".cm-scroller": {
    fontFamily: '"Source Code Pro Variable", "Tangency Math", monospace',
    fontSize: "0.8125rem",
    lineHeight: "1.375rem",
    fontVariantLigatures: "none",
    overflowX: "auto",
  },
  ".cm-content": { padding: "0", caretColor: "var(--ink)", minHeight: "1.375rem" },
  ".cm-line": { padding: "0" },
  ".cm-cursor": { borderLeftColor: "var(--ink)", borderLeftWidth: "1.5px" },
  "&.cm-focused > .cm-scroller > .cm-selectionLayer .cm-selectionBackground, .cm-selectionBackground": {
    backgroundColor: "var(--accent-wash)",
  },
  ".cm-matchingBracket, &.cm-focused .cm-matchingBracket": {
    backgroundColor: "transparent",
    borderBottom: "1px solid var(--ctl)",
  },
  ".cm-placeholder": { color: "var(--ink3)" },
  // A mistake: a wavy line in the colour of failure, on its wash.
  ".cm-lintRange": { backgroundImage: "none", paddingBottom: "0" },
  ".cm-lintRange-error": {
    backgroundColor: "var(--fail-wash)",
    textDecoration: "underline wavy var(--fail) 1.5px",
    textUnderlineOffset: "0.25em",
  },
  ".cm-lintPoint-error:after": { borderBottomColor: "var(--fail)" },
  ".cm-reference": {
    color: "var(--accent)",
    textDecoration: "underline",
    textDecorationThickness: "1px",
    textUnderlineOffset: "0.22em",
  },
  ".cm-reference span": { color: "inherit" },
  // A change not yet estimated: the old value struck out, the new one beside it.
  ".cm-changed": { backgroundColor: "var(--stale-wash)" },
  ".cm-struck": {
    backgroundColor: "var(--stale-wash)",
    color: "var(--ink3)",
    textDecoration: "line-through",
    paddingInline: "0.15em",
    marginRight: "0.35em",
  },
});

const popovers = EditorView.theme({
  ".cm-tooltip": {
    border: "1px solid var(--ink)",
    borderRadius: "0",
    backgroundColor: "var(--recto)",
    color: "var(--ink)",
    fontFamily: '"Source Sans 3 Variable", "Tangency Math", sans-serif',
    fontSize: "0.8125rem",
    lineHeight: "1.125rem",
    maxWidth: "26rem",
  },
  ".cm-tooltip.cm-tooltip-autocomplete > ul": { fontFamily: "inherit", maxHeight: "15rem" },
  ".cm-tooltip.cm-tooltip-autocomplete > ul > li": {
    display: "flex",
    justifyContent: "space-between",
    gap: "1.25rem",
    padding: "0.25rem 0.625rem",
    lineHeight: "1.25rem",
  },
  ".cm-tooltip-autocomplete ul li[aria-selected]": {
    backgroundColor: "var(--accent)",
    color: "var(--accent-ink)",
  },
  ".cm-completionLabel": { fontFamily: '"Source Code Pro Variable", monospace', whiteSpace: "nowrap" },
  ".cm-completionMatchedText": { textDecoration: "none", fontWeight: "600" },
  ".cm-completionDetail": {
    fontStyle: "normal",
    marginLeft: "0",
    overflow: "hidden",
    textOverflow: "ellipsis",
    whiteSpace: "nowrap",
    color: "var(--ink2)",
  },
  "li[aria-selected] .cm-completionDetail": { color: "var(--accent-ink)" },
  ".cm-diagnostic": { padding: "0.5rem 0.75rem", borderLeft: "none" },
  ".cm-diagnosticAction": {
    display: "inline-flex",
    margin: "0.375rem 0 0",
    padding: "0.125rem 0.625rem",
    minHeight: "1.5rem",
    border: "1px solid var(--ctl)",
    borderRadius: "3px",
    backgroundColor: "transparent",
    color: "var(--ink)",
    fontWeight: "500",
  },
});

/** The others' carets: they move at once, and carry a flag with a first name. */
const carets = EditorView.theme({
  ".cm-ySelectionCaret": { border: "none", width: "2px", marginInline: "-1px", padding: "0.15em 0" },
  ".cm-ySelectionCaretDot": { display: "none" },
  ".cm-ySelectionInfo": {
    opacity: "1",
    top: "-1.2rem",
    left: "0",
    padding: "0 0.3rem",
    color: "var(--recto)",
    fontFamily: '"Source Sans 3 Variable", sans-serif',
    fontSize: "0.78125rem",
    fontWeight: "600",
    lineHeight: "1rem",
    pointerEvents: "none",
    transition: "none",
  },
});

const words = HighlightStyle.define([
  {
    tag: [tags.definition(tags.propertyName), tags.propertyName, tags.punctuation, tags.separator],
    color: "var(--ink2)",
  },
  { tag: [tags.string, tags.content, tags.number, tags.bool, tags.null, tags.keyword], color: "var(--ink)" },
  { tag: [tags.squareBracket, tags.brace], color: "var(--ink2)" },
  { tag: [tags.comment, tags.lineComment], color: "var(--ink3)", fontStyle: "italic" },
]);

export const editorTheme: Extension = [page, popovers, carets, syntaxHighlighting(words)];
