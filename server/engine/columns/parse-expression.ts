import { createRequire } from "node:module";
import type {
  AccessorNode,
  ConditionalNode,
  ConstantNode,
  FunctionNode,
  MathNode,
  OperatorNode,
  ParenthesisNode,
  RelationalNode,
  SymbolNode,
} from "mathjs";
import type { Problem } from "../../../shared/schemas/problem.ts";
import { nearestWord } from "../../../shared/study/nearest-word.ts";
import { Refusal } from "../refusal.ts";
import { quoteCell } from "./cell-text.ts";
import { FUNCTIONS, OPERATORS } from "./expression-operations.ts";
import type { ExpressionTree } from "./expression-tree.ts";

const LONGEST = 500;
const DEEPEST_BRACKETS = 40;
/** A sum of many columns is a tall tree without a single bracket. */
const DEEPEST_TREE = 260;

type Parse = (source: string) => MathNode;
let parser: Parse | undefined;

/** The parser alone, and only once an expression asks for it: the whole library takes a second to load. */
function mathParser(): Parse {
  if (parser === undefined) {
    const { create, parseDependencies } = createRequire(import.meta.url)("mathjs/number") as typeof import("mathjs");
    parser = create({ parseDependencies }).parse as Parse;
  }
  return parser;
}

/**
 * Read an expression: constants, columns, + - * / ^, comparisons (chained too), and, or, not, brackets,
 * test ? yes : no, and the functions of `FUNCTIONS`. A column whose name is no word is written col("its name").
 * A text column is compared with a text: region == "north". Everything else is refused by what it is; nothing
 * is ever run.
 */
export function parseExpression(source: string): ExpressionTree {
  if (source.length > LONGEST) {
    throw new Refusal(`An expression has at most ${LONGEST} characters; this one has ${source.length}.`);
  }
  let root: MathNode;
  try {
    refuseDepth(nesting(source), DEEPEST_BRACKETS);
    root = mathParser()(source);
  } catch (error) {
    if (error instanceof Refusal) throw error;
    const reason = error instanceof RangeError ? "it is nested too deeply" : (error as Error).message;
    throw new Refusal(`${quoteCell(source)} cannot be read as an expression: ${reason}.`.replace("..", "."));
  }
  const problems: Problem[] = [];
  const tree = translate(root, problems, 0);
  if (problems.length > 0) throw new Refusal(problems);
  return tree;
}

/** Brackets open at once, at most: known before the recursive parser sees them. */
function nesting(source: string): number {
  let open = 0;
  let deepest = 0;
  for (const sign of source) {
    if (sign === "(" || sign === "[" || sign === "{") deepest = Math.max(deepest, ++open);
    if (sign === ")" || sign === "]" || sign === "}") open--;
  }
  return deepest;
}

function refuseDepth(depth: number, deepest: number): void {
  if (depth > deepest) throw new Refusal(`An expression nests at most ${deepest} deep; this one reaches ${depth}.`);
}

const NOTHING: ExpressionTree = { kind: "number", value: Number.NaN };

function translate(node: MathNode, problems: Problem[], depth: number): ExpressionTree {
  refuseDepth(depth, DEEPEST_TREE);
  const inner = (child: MathNode) => translate(child, problems, depth + 1);
  const refuse = (sentence: string, nearest?: string): ExpressionTree => {
    problems.push({ sentence, ...(nearest === undefined ? {} : { nearest }) });
    return NOTHING;
  };
  switch (node.type) {
    case "ParenthesisNode":
      return inner((node as ParenthesisNode).content);
    case "ConstantNode":
      return constant((node as ConstantNode).value, refuse);
    case "SymbolNode":
      return { kind: "column", name: (node as SymbolNode).name };
    case "OperatorNode":
      return operator(node as OperatorNode, inner, refuse);
    case "RelationalNode":
      return chain(node as RelationalNode, inner);
    case "ConditionalNode": {
      const { condition, trueExpr, falseExpr } = node as ConditionalNode;
      return { kind: "call", name: "?", arguments: [condition, trueExpr, falseExpr].map(inner) };
    }
    case "FunctionNode":
      return call(node as FunctionNode, inner, refuse);
    default:
      return refuse(forbidden(node));
  }
}

type Refuse = (sentence: string, nearest?: string) => ExpressionTree;
type Inner = (child: MathNode) => ExpressionTree;

function constant(value: unknown, refuse: Refuse): ExpressionTree {
  if (typeof value === "boolean") return { kind: "number", value: Number(value) };
  if (typeof value === "string") return { kind: "text", value };
  if (typeof value === "number" && Number.isFinite(value)) return { kind: "number", value };
  if (value === undefined) return refuse("The expression is empty.");
  return refuse(`${String(value)} is not a finite number; missing(column) asks whether a value is missing.`);
}

function operator(node: OperatorNode, inner: Inner, refuse: Refuse): ExpressionTree {
  if (node.implicit) return refuse(`${quoteCell(node.toString())} has no sign between its parts; write * to multiply.`);
  const known = Object.hasOwn(OPERATORS, node.op) ? OPERATORS[node.op] : undefined;
  if (known === undefined || node.args.length < known.least || node.args.length > known.most) {
    const instead: Record<string, string> = { "%": "mod(a, b)", "!": "not", "&": "and", "|": "or", "~": "not" };
    const nearest = instead[node.op];
    const advice = nearest ? ` The nearest is ${nearest}.` : ` There are ${Object.keys(OPERATORS).join(" ")}.`;
    return refuse(`${node.op} is no operation of an expression.${advice}`, nearest);
  }
  return { kind: "call", name: node.op, arguments: node.args.map(inner) };
}

const RELATIONS: Readonly<Record<string, string>> = {
  smaller: "<",
  smallerEq: "<=",
  larger: ">",
  largerEq: ">=",
  equal: "==",
  unequal: "!=",
};

/** 18 <= age < 65 is 18 <= age and age < 65. */
function chain(node: RelationalNode, inner: Inner): ExpressionTree {
  const operands = node.params.map(inner);
  const links = (node.conditionals as readonly string[]).map(
    (name, at): ExpressionTree => ({
      kind: "call",
      name: RELATIONS[name],
      arguments: [operands[at], operands[at + 1]],
    }),
  );
  return links.reduce((left, right) => ({ kind: "call", name: "and", arguments: [left, right] }));
}

function call(node: FunctionNode, inner: Inner, refuse: Refuse): ExpressionTree {
  const callee = node.fn as MathNode;
  if (callee.type !== "SymbolNode") return refuse(`${quoteCell(callee.toString())} cannot be called.`);
  const { name } = callee as SymbolNode;
  if (name === "col") {
    const [argument] = node.args as MathNode[];
    const text = argument?.type === "ConstantNode" ? (argument as ConstantNode).value : undefined;
    if (node.args.length === 1 && typeof text === "string") return { kind: "column", name: text };
    return refuse('col takes the name of a column in quotes, such as col("price of milk").');
  }
  const known = Object.hasOwn(FUNCTIONS, name) ? FUNCTIONS[name] : undefined;
  if (known === undefined) {
    const nearest = nearestWord(name, Object.keys(FUNCTIONS));
    const advice = nearest ? `The nearest is ${nearest}` : `There are ${Object.keys(FUNCTIONS).join(", ")}`;
    return refuse(`${name} is no function of an expression. ${advice}.`, nearest);
  }
  const given = node.args.length;
  if (given < known.least || given > known.most) {
    const takes = known.least === known.most ? `${known.least}` : `${known.least} to ${known.most}`;
    return refuse(`${name} takes ${takes} ${takes === "1" ? "value" : "values"}, and has ${given}.`);
  }
  return { kind: "call", name, arguments: node.args.map(inner) };
}

function forbidden(node: MathNode): string {
  const written = quoteCell(node.toString());
  if (node.type === "AccessorNode") {
    const { object } = node as AccessorNode;
    if (object.type === "SymbolNode") {
      return `${written} asks for a part of ${object.toString()}; a column of that name is written col(${written}).`;
    }
  }
  const named: Record<string, string> = {
    AssignmentNode: `${written} assigns; to compare, write ==`,
    FunctionAssignmentNode: `${written} defines a function`,
    BlockNode: "There are several expressions; an expression is one line",
    ArrayNode: `${written} is a list`,
    ObjectNode: `${written} is an object`,
    RangeNode: `${written} is a range; write low <= column <= high`,
    IndexNode: `${written} is an index`,
    AccessorNode: `${written} asks for a part of something`,
  };
  const what = named[node.type] ?? `${written} is no arithmetic`;
  return `${what}. An expression has numbers, columns, + - * / ^, comparisons, and, or, not, and elementary functions.`;
}
