/**
 * Checks the doc comments of what lib/ and kernel/mod.ts export: every exported symbol has one, and every
 * numeric parameter of an exported function has a unit, `@param name [unit] ...`.
 */
import ts from "typescript";
import { type ExportedSymbol, exportedSymbols } from "./structure/exported_symbols.ts";
import { readSourceTree, type SourceFile } from "./structure/source_tree.ts";
import { finish, projectRoot } from "./findings.ts";

/** Every missing doc comment and every parameter without a unit in the tree at `root`. */
export function checkDocs(root: string): string[] {
  return readSourceTree(root).filter(({ path }) =>
    /^(lib|kernel)\//.test(path) && !/\/(mod\.ts|_[^/]*)$/.test(path) && !path.endsWith(".d.ts")
  ).flatMap(checkFile);
}

function checkFile(file: SourceFile): string[] {
  const isDocumented = (symbol: ExportedSymbol) =>
    symbol.declaration !== undefined && ts.getJSDocCommentsAndTags(symbol.declaration).length > 0;
  const symbols = exportedSymbols(file);
  const documented = new Set(symbols.filter(isDocumented).map((symbol) => symbol.name));
  const internals = new Set(symbols.filter((symbol) => symbol.internal).map((each) => each.name));
  const reported = new Set<string>();
  return symbols.flatMap((symbol) => {
    const { name, line, declaration } = symbol;
    if (!declaration || internals.has(name)) return [];
    const place = `${file.path}:${line}`;
    // Of overloads, which share a name, one carries the comment.
    if (!documented.has(name) && !reported.has(name)) {
      reported.add(name);
      return [`${place}: ${name} has no doc comment`];
    }
    if (!isDocumented(symbol)) return [];
    if (!ts.isFunctionDeclaration(declaration)) return [];
    return declaration.parameters.filter(isNumeric).flatMap((parameter) => {
      const [tag] = ts.getJSDocParameterTags(parameter);
      const comment = tag ? ts.getTextOfJSDocComment(tag.comment) ?? "" : undefined;
      const parameterName = parameter.name.getText();
      if (comment === undefined) return [`${place}: ${name} has no @param ${parameterName} [unit]`];
      if (/\[[^\]]+\]/.test(comment)) return [];
      return [`${place}: @param ${parameterName} of ${name} has no [unit]; [1] for a pure number`];
    });
  });
}

function isNumeric(parameter: ts.ParameterDeclaration): boolean {
  return parameter.type?.kind === ts.SyntaxKind.NumberKeyword;
}

if (import.meta.main) finish(checkDocs(projectRoot()));
