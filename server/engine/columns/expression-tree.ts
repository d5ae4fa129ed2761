/** An expression after its check: nothing is left in it that could reach outside its columns. */
export type ExpressionTree =
  | { readonly kind: "number"; readonly value: number }
  | { readonly kind: "text"; readonly value: string }
  | { readonly kind: "column"; readonly name: string }
  | { readonly kind: "call"; readonly name: string; readonly arguments: readonly ExpressionTree[] };

/** Names of the columns an expression reads, in the order of first use. */
export function columnsRead(tree: ExpressionTree, found = new Set<string>()): Set<string> {
  if (tree.kind === "column") found.add(tree.name);
  if (tree.kind === "call") for (const argument of tree.arguments) columnsRead(argument, found);
  return found;
}
