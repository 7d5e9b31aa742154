import ts from "typescript";
import { lineOf, type SourceFile } from "./source_tree.ts";

/** A symbol that a file exports. */
export interface ExportedSymbol {
  readonly name: string;
  /** Whether its doc comment carries the tag `@internal`: used across files, not part of mod.ts. */
  readonly internal: boolean;
  /** 1-based. */
  readonly line: number;
  /** The declaration; absent for a re-export. */
  readonly declaration?: ts.Node;
}

/** The symbols a file exports, in order; a default export is named `default`, `export *` is `*`. */
export function exportedSymbols({ ast }: SourceFile): ExportedSymbol[] {
  return ast.statements.flatMap((statement) => {
    if (ts.isExportAssignment(statement)) return [describe(ast, "default", statement)];
    if (ts.isExportDeclaration(statement)) return describeList(ast, statement);
    const modifiers = ts.canHaveModifiers(statement) ? ts.getModifiers(statement) ?? [] : [];
    if (!modifiers.some((modifier) => modifier.kind === ts.SyntaxKind.ExportKeyword)) return [];
    if (modifiers.some((modifier) => modifier.kind === ts.SyntaxKind.DefaultKeyword)) {
      return [describe(ast, "default", statement)];
    }
    if (ts.isVariableStatement(statement)) {
      return statement.declarationList.declarations.flatMap((declaration) =>
        boundNames(declaration.name).map((name) => describe(ast, name, declaration))
      );
    }
    const name = (statement as ts.DeclarationStatement).name?.getText(ast);
    return name === undefined ? [] : [describe(ast, name, statement)];
  });
}

function describe(ast: ts.SourceFile, name: string, declaration: ts.Node): ExportedSymbol {
  const internal = ts.getJSDocTags(declaration).some((tag) => tag.tagName.text === "internal");
  return { name, internal, line: lineOf(ast, declaration), declaration };
}

function describeList(ast: ts.SourceFile, statement: ts.ExportDeclaration): ExportedSymbol[] {
  const line = lineOf(ast, statement);
  const clause = statement.exportClause;
  if (!clause) return [{ name: "*", internal: false, line }];
  if (ts.isNamespaceExport(clause)) return [{ name: clause.name.text, internal: false, line }];
  return clause.elements.map((element) => ({ name: element.name.text, internal: false, line }));
}

function boundNames(name: ts.BindingName): string[] {
  if (ts.isIdentifier(name)) return [name.text];
  return name.elements.flatMap((element) =>
    ts.isOmittedExpression(element) ? [] : boundNames(element.name)
  );
}
