import ts from "typescript";
import { lineOf, type SourceFile } from "./source_tree.ts";

/**
 * Every thrown text that is not an error, every plain `Error` in lib/ (RangeError is for values, TypeError
 * for kind and shape, SyntaxError for text), and every error message with a final period.
 */
export function findErrorFaults(files: readonly SourceFile[]): string[] {
  return files.filter((file) => /^(lib|kernel|reports)\//.test(file.path)).flatMap(findInFile);
}

function findInFile({ path, ast }: SourceFile): string[] {
  const findings: string[] = [];
  const report = (node: ts.Node, text: string) =>
    findings.push(`${path}:${lineOf(ast, node)}: ${text}`);
  const visit = (node: ts.Node) => {
    if (ts.isThrowStatement(node) && isText(node.expression)) {
      report(node, "throws a text; throw an error");
    }
    if (ts.isNewExpression(node) && /Error$/.test(node.expression.getText())) {
      if (path.startsWith("lib/") && node.expression.getText() === "Error") {
        report(node, "makes a plain Error; use RangeError, TypeError or SyntaxError");
      }
      const [message] = node.arguments ?? [];
      if (message && /(^|[^.])\.$/.test(lastText(message))) {
        report(node, "the message has a final period");
      }
    }
    ts.forEachChild(node, visit);
  };
  visit(ast);
  return findings;
}

function isText(node: ts.Expression): boolean {
  return ts.isStringLiteralLike(node) || ts.isTemplateExpression(node);
}

/** The text an expression ends in, as far as it is written out. */
function lastText(node: ts.Expression): string {
  if (ts.isStringLiteralLike(node)) return node.text;
  if (ts.isTemplateExpression(node)) return node.templateSpans.at(-1)?.literal.text ?? "";
  if (ts.isBinaryExpression(node) && node.operatorToken.kind === ts.SyntaxKind.PlusToken) {
    return lastText(node.right);
  }
  return "";
}
