import type { QuotedNumber } from "../../../shared/schemas/text.ts";
import { atMarks, withoutMarks } from "./marked-text.ts";

/** As much of a tree of Markdown, or of what is drawn from it, as is changed here. */
interface TreeNode {
  type: string;
  value?: string;
  children?: TreeNode[];
  tagName?: string;
  properties?: Record<string, unknown>;
  data?: { hChildren?: TreeNode[] } & Record<string, unknown>;
  [key: string]: unknown;
}

/** Deeper than any prose: what is nested further stands there as its words alone. */
const DEEPEST = 24;

interface Reader {
  data(): Record<string, unknown>;
}

/** Neither HTML nor code by indentation: signs of both are text like any other. */
export function proseOnly(this: unknown): void {
  const data = (this as Reader).data();
  const others = (data.micromarkExtensions as unknown[] | undefined) ?? [];
  data.micromarkExtensions = [...others, { disable: { null: ["htmlFlow", "htmlText", "codeIndented"] } }];
}

/** A tree that is no deeper than pages can draw; none of the walks below needs more of the stack than that. */
export function noDeeper() {
  return (root: TreeNode): void => {
    let level: TreeNode[] = [root];
    for (let depth = 0; level.length > 0; depth++) {
      if (depth >= DEEPEST) for (const node of level) flatten(node);
      level = level.flatMap(({ children = [] }) => children);
    }
  };
}

function flatten(node: TreeNode): void {
  if (node.children === undefined) return;
  const words: string[] = [];
  const left = [...node.children].reverse();
  for (let next = left.pop(); next !== undefined; next = left.pop()) {
    if (typeof next.value === "string") words.push(next.value);
    for (const child of [...(next.children ?? [])].reverse()) left.push(child);
  }
  node.children = [{ type: "text", value: words.join(" ") }];
}

interface Quoting {
  readonly text: string;
  readonly quotations: readonly QuotedNumber[];
}

/** Marks leave everything but plain text: code, mathematics, addresses. */
export function marksInTextOnly({ text, quotations }: Quoting) {
  const restore = (node: TreeNode): void => {
    if (node.type !== "text") {
      for (const [key, value] of Object.entries(node)) {
        if (key !== "type" && typeof value === "string") node[key] = withoutMarks(value, text, quotations);
      }
    }
    for (const child of node.data?.hChildren ?? []) restoreAll(child);
    for (const child of node.children ?? []) restore(child);
  };
  const restoreAll = (node: TreeNode): void => {
    if (typeof node.value === "string") node.value = withoutMarks(node.value, text, quotations);
    for (const child of node.children ?? []) restoreAll(child);
  };
  return (root: TreeNode): void => restore(root);
}

/** The element that stands for a quotation, and the ids of notes, which several texts of one page must not share. */
export function quotationsInPlace({ quotations, prefix }: Pick<Quoting, "quotations"> & { readonly prefix: string }) {
  const inPlace = (node: TreeNode): void => {
    if (node.properties?.id === "footnote-label") node.properties.id = `${prefix}notes`;
    if (node.properties?.ariaDescribedBy) node.properties.ariaDescribedBy = [`${prefix}notes`];
    node.children = node.children?.flatMap((child): TreeNode[] => {
      if (child.type !== "text" || !child.value) {
        inPlace(child);
        return [child];
      }
      return atMarks(child.value).map((part) => {
        if (typeof part === "string") return { type: "text", value: part };
        const isKnown = part < quotations.length;
        return { type: "element", tagName: "quoted-number", properties: { place: isKnown ? part : -1 }, children: [] };
      });
    });
  };
  return (root: TreeNode): void => inPlace(root);
}

/**
 * The heads of a text as those of an outline that leaves out no level: the first begins at the first, whichever sign it
 * was written with, and one below another is one level deeper. Which stands below which stays as written.
 */
export function headsInOrder() {
  return (root: TreeNode): void => {
    const above: number[] = [];
    for (const head of headsOf(root)) {
      const written = Number(head.tagName?.slice(1));
      while ((above.at(-1) ?? 0) >= written) above.pop();
      above.push(written);
      head.tagName = `h${above.length}`;
    }
  };
}

function headsOf(node: TreeNode): TreeNode[] {
  if (/^h[1-6]$/.test(node.tagName ?? "")) return [node];
  return (node.children ?? []).flatMap(headsOf);
}

/** Addresses a text may lead to: pages of the web, mail, and its own notes. Anything else is no address. */
export function safeAddress(address: string): string {
  return /^(https?:\/\/|mailto:|#)/i.test(address) ? address : "";
}
