import ts from "typescript";
import { nodesOf } from "./source-tree.ts";
import type { SourceFile } from "./source-tree.ts";

const LONGEST_CORE_FILE = 200;
const NEXT_FILES = /^app\/(?:.*\/)?(page|layout|template|error|global-error|loading|not-found|default|manifest|robots|sitemap|icon)\.tsx?$/;
const CONFIG_FILES = /^(\.config\/|next\.config\.js$|prisma\/prisma\.config\.ts$)/;
const NAMELESS = /(^|[-_/])(utils?|helpers?|misc|common|stuff)([-_./]|$)/;
const CLOCK_AND_CHANCE = /^(Date\.now|Math\.random|performance\.now|crypto\.\w+|setTimeout|setInterval|queueMicrotask|fetch|console\.\w+|require)$/;
/** Leaflet's names for types that let a bare pair through. */
const PAIRS = /^LatLng(Tuple|Expression|BoundsExpression|BoundsLiteral)$/;
const STATEFUL = new Set(["Map", "Set", "WeakMap", "WeakSet", "Array"]);

/** One sentence for each place where a file leaves the manners of DEVELOPERS.md. */
export function breachesOf(file: SourceFile): string[] {
  const found = [...fileBreaches(file), ...stateBreaches(file), ...nodesOf(file.tree).flatMap((node) => nodeBreaches(file, node))];
  return found.map((breach) => `${file.path}${breach}`);
}

function fileBreaches({ path, lineCount, imports }: SourceFile): string[] {
  const breaches: string[] = [];
  if (path.startsWith("lib/core/") && lineCount > LONGEST_CORE_FILE) breaches.push(` has ${lineCount} lines; ${LONGEST_CORE_FILE} is the most`);
  if (NAMELESS.test(path)) breaches.push(" is named after no idea");
  for (const item of imports) {
    if (item.path !== null && !/\.(tsx?|mjs|css|json)$/.test(item.path)) breaches.push(` imports ${item.specifier} without its extension`);
  }
  return breaches;
}

/** State of a module: a variable that can be set, or a collection that starts empty and can only be there to be filled. */
function stateBreaches(file: SourceFile): string[] {
  if (!file.path.startsWith("lib/") && !file.path.startsWith("app/")) return [];
  return file.tree.statements.filter(ts.isVariableStatement).flatMap(({ declarationList }) => {
    const isConst = (declarationList.flags & ts.NodeFlags.Const) !== 0;
    const names = declarationList.declarations.filter((declaration) => !isConst || startsEmpty(declaration.initializer));
    return names.map((declaration) => at(file, declaration, `module state "${declaration.name.getText()}"`));
  });
}

function startsEmpty(value: ts.Expression | undefined): boolean {
  if (value === undefined) return true;
  if (ts.isArrayLiteralExpression(value)) return value.elements.length === 0;
  if (ts.isObjectLiteralExpression(value)) return value.properties.length === 0;
  return ts.isNewExpression(value) && STATEFUL.has(value.expression.getText()) && (value.arguments ?? []).length === 0;
}

function nodeBreaches(file: SourceFile, node: ts.Node): string[] {
  const breaches: string[] = [];
  const say = (what: string): void => void breaches.push(at(file, node, what));
  if (node.kind === ts.SyntaxKind.AnyKeyword) say("any");
  if (ts.isNonNullExpression(node)) say("a non-null assertion");
  if (isDefaultExport(node) && !NEXT_FILES.test(file.path) && !CONFIG_FILES.test(file.path)) say("a default export");
  if (ts.isClassLike(node) && !extendsError(node)) say("a class that is no error");
  if (file.path.startsWith("lib/core/")) breaches.push(...impurities(file, node));
  if (ts.isIdentifier(node) && PAIRS.test(node.text) && isOutsideChart(file.path)) say(`${node.text}: pairs belong in lib/chart`);
  return breaches;
}

function isDefaultExport(node: ts.Node): boolean {
  if (ts.isExportAssignment(node)) return true;
  return ts.canHaveModifiers(node) && (ts.getModifiers(node) ?? []).some((modifier) => modifier.kind === ts.SyntaxKind.DefaultKeyword);
}

function extendsError(node: ts.ClassLikeDeclaration): boolean {
  return (node.heritageClauses ?? []).some((clause) => /^extends \w*Error$/.test(clause.getText()));
}

function isOutsideChart(path: string): boolean {
  return (path.startsWith("lib/") || path.startsWith("app/")) && !path.startsWith("lib/chart/");
}

/** The science gives the same answer at any time on any machine, at once. */
function impurities(file: SourceFile, node: ts.Node): string[] {
  if (ts.isCallExpression(node) && CLOCK_AND_CHANCE.test(node.expression.getText())) return [at(file, node, node.expression.getText())];
  if (ts.isNewExpression(node) && node.expression.getText() === "Date" && (node.arguments ?? []).length === 0) return [at(file, node, "new Date()")];
  if (ts.isPropertyAccessExpression(node) && /^(process|globalThis)$/.test(node.expression.getText())) {
    return [at(file, node, node.getText())];
  }
  if (ts.isAwaitExpression(node) || node.kind === ts.SyntaxKind.AsyncKeyword) return [at(file, node, "asynchronous work")];
  return [];
}

function at(file: SourceFile, node: ts.Node, what: string): string {
  const { line } = file.tree.getLineAndCharacterOfPosition(node.getStart());
  return `:${line + 1} holds ${what}`;
}
