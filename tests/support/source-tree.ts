import { existsSync, readdirSync, readFileSync } from "node:fs";
import { dirname, join } from "node:path";
import ts from "typescript";

export interface Import {
  /** As written. */
  readonly specifier: string;
  /** Path from the package's root where it is a file of ours; null for a package. */
  readonly path: string | null;
  readonly isTypeOnly: boolean;
}

export interface SourceFile {
  /** From the package's root, with forward slashes. */
  readonly path: string;
  readonly lineCount: number;
  readonly isClient: boolean;
  readonly imports: readonly Import[];
  /** Files of ours that it starts as workers. */
  readonly workers: readonly string[];
  readonly tree: ts.SourceFile;
}

const ROOMS = ["app", "lib", "prisma", "tests", ".config"];
const SOURCE = /\.(ts|tsx|mjs|js)$/;

/** All source files of the project, parsed; generated code left out. */
export function readSourceTree(root = "."): SourceFile[] {
  const inRooms = ROOMS.filter((room) => existsSync(join(root, room))).flatMap((room) =>
    readdirSync(join(root, room), { recursive: true, encoding: "utf8" }).map((name) => `${room}/${name.replaceAll("\\", "/")}`),
  );
  return [...inRooms, ...readdirSync(root).filter((name) => name === "proxy.ts" || name === "next.config.js")]
    .filter((path) => SOURCE.test(path) && !path.endsWith(".d.ts"))
    .filter((path) => !path.startsWith("lib/store/generated/") && !path.startsWith("tests/output/"))
    .sort()
    .map((path) => parseSource(path, readFileSync(join(root, path), "utf8")));
}

export function parseSource(path: string, text: string): SourceFile {
  const tree = ts.createSourceFile(path, text, ts.ScriptTarget.Latest, true);
  const first = tree.statements[0];
  const directive = first !== undefined && ts.isExpressionStatement(first) && ts.isStringLiteral(first.expression) ? first.expression.text : "";
  return {
    path,
    lineCount: text.trimEnd().split("\n").length,
    isClient: directive === "use client",
    imports: nodesOf(tree).flatMap((node) => importOf(path, node)),
    workers: nodesOf(tree).flatMap((node) => workerOf(path, node)),
    tree,
  };
}

/** Every node under `root`, itself first. */
export function nodesOf(root: ts.Node): ts.Node[] {
  const found: ts.Node[] = [root];
  // forEachChild, and not getChildren, which would parse every token and comment once more.
  ts.forEachChild(root, (child) => void found.push(...nodesOf(child)));
  return found;
}

function importOf(path: string, node: ts.Node): Import[] {
  if (ts.isImportDeclaration(node) && ts.isStringLiteral(node.moduleSpecifier)) {
    const isTypeOnly = node.importClause?.phaseModifier === ts.SyntaxKind.TypeKeyword;
    return [described(path, node.moduleSpecifier.text, isTypeOnly)];
  }
  if (ts.isExportDeclaration(node) && node.moduleSpecifier !== undefined && ts.isStringLiteral(node.moduleSpecifier)) {
    return [described(path, node.moduleSpecifier.text, node.isTypeOnly)];
  }
  if (ts.isCallExpression(node) && node.expression.kind === ts.SyntaxKind.ImportKeyword) {
    const [argument] = node.arguments;
    return argument !== undefined && ts.isStringLiteral(argument) ? [described(path, argument.text, false)] : [];
  }
  if (ts.isImportTypeNode(node) && ts.isLiteralTypeNode(node.argument) && ts.isStringLiteral(node.argument.literal)) {
    return [described(path, node.argument.literal.text, true)];
  }
  return [];
}

/** `new Worker(new URL("./x.ts", import.meta.url))` */
function workerOf(path: string, node: ts.Node): string[] {
  if (!ts.isNewExpression(node) || node.expression.getText() !== "Worker") return [];
  const url = node.arguments?.[0];
  if (url === undefined || !ts.isNewExpression(url) || url.expression.getText() !== "URL") return [];
  const [address] = url.arguments ?? [];
  return address !== undefined && ts.isStringLiteral(address) ? [join(dirname(path), address.text)] : [];
}

function described(from: string, specifier: string, isTypeOnly: boolean): Import {
  const ours = /^#(lib|tests)\//.test(specifier) ? specifier.slice(1) : null;
  const path = specifier.startsWith(".") ? join(dirname(from), specifier).replaceAll("\\", "/") : ours;
  return { specifier, path, isTypeOnly };
}
