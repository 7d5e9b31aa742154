import ts from "typescript";
import { lineOf, type SourceFile } from "./source_tree.ts";

/** Globals that would tie lib/ to a machine, a page, a clock or a hidden random source. */
const IMPURE_GLOBALS = new Set([
  ...["Deno", "process", "globalThis", "self", "Worker", "SharedWorker"],
  ...["document", "window", "navigator", "localStorage", "sessionStorage", "alert", "prompt"],
  ...["fetch", "WebSocket", "XMLHttpRequest", "crypto"],
  ...["Date", "performance", "setTimeout", "setInterval", "console"],
]);

/** Every use of the machine, the page, the clock, the console or `Math.random` in lib/. */
export function findImpurities(files: readonly SourceFile[]): string[] {
  return files.filter((file) => file.path.startsWith("lib/")).flatMap(findInFile);
}

function findInFile({ path, ast }: SourceFile): string[] {
  const declared = declaredNames(ast);
  const findings: string[] = [];
  const visit = (node: ts.Node) => {
    const found = impureName(node, declared);
    if (found) {
      findings.push(
        `${path}:${lineOf(ast, node)}: uses ${found}, but lib/ has no machine, page, clock, ` +
          "console or hidden random source; take it as an argument",
      );
    }
    ts.forEachChild(node, visit);
  };
  visit(ast);
  return findings;
}

function impureName(node: ts.Node, declared: ReadonlySet<string>): string | undefined {
  if (ts.isMetaProperty(node) && node.keywordToken === ts.SyntaxKind.ImportKeyword) {
    return "import.meta";
  }
  if (
    ts.isPropertyAccessExpression(node) && node.name.text === "random" &&
    node.expression.getText() === "Math"
  ) {
    return "Math.random";
  }
  if (!ts.isIdentifier(node) || !IMPURE_GLOBALS.has(node.text)) return undefined;
  return isReference(node) && !declared.has(node.text) ? node.text : undefined;
}

/** Whether an identifier refers to a variable, as against naming a property or a member. */
function isReference(node: ts.Identifier): boolean {
  const parent = node.parent;
  if (ts.isPropertyAccessExpression(parent)) return parent.expression === node;
  if (ts.isQualifiedName(parent)) return parent.left === node;
  if (ts.isShorthandPropertyAssignment(parent)) return true;
  if (ts.isBindingElement(parent) && parent.propertyName === node) return false;
  if (ts.isJSDoc(parent) || ts.isJSDocParameterTag(parent) || ts.isJSDocLink(parent)) return false;
  return !((ts.isPropertyAssignment(parent) || ts.isTypeElement(parent) ||
    ts.isClassElement(parent) || ts.isEnumMember(parent)) && parent.name === node);
}

/** Names a file binds itself, such as a parameter called `window`. */
function declaredNames(ast: ts.SourceFile): ReadonlySet<string> {
  const names = new Set<string>();
  const visit = (node: ts.Node) => {
    if (
      (ts.isVariableDeclaration(node) || ts.isParameter(node) || ts.isBindingElement(node) ||
        ts.isFunctionDeclaration(node) || ts.isImportSpecifier(node)) &&
      node.name && ts.isIdentifier(node.name)
    ) {
      names.add(node.name.text);
    }
    ts.forEachChild(node, visit);
  };
  visit(ast);
  return names;
}
