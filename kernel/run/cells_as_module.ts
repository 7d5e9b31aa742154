import ts from "typescript";
import type { NotebookCell } from "./notebook.ts";

/** A place in a cell's source; lines and columns from 1. */
export interface CellPlace {
  /** Position of the cell among all cells of the notebook, from 1. */
  readonly cell: number;
  readonly line: number;
  readonly column: number;
}

/** A notebook's code cells as one module. */
export interface CellModule {
  readonly text: string;
  /** Where a place of the module comes from; undefined for a line that comes from no cell. */
  placeOf(line: number, column: number): CellPlace | undefined;
}

/** Where one line of the module comes from: `column` of the cell stands at `at` of the module. */
interface Origin extends CellPlace {
  readonly at: number;
}

/** A name imported from a module, written into the braces of the merged import. */
interface Specifier {
  readonly text: string;
  readonly typeOnly: boolean;
  readonly origin: CellPlace;
}

/** The imports of one module (and one set of attributes) in all cells. */
interface Import {
  readonly from: string;
  readonly origin: CellPlace;
  readonly named: Map<string, Specifier>;
  /** Statements that braces cannot hold: namespaces, bare imports. */
  readonly whole: Map<string, Specifier>;
}

/**
 * Writes the code cells as one module that can be type-checked: imports merged at its head, every
 * cell a block inside the one before, so that a name declared again is a new one, as in the kernel.
 * Columns inside a cell stay as they are. Relative imports are made absolute.
 *
 * @param base URL of the notebook's folder, ending in "/"
 */
export function cellsAsModule(cells: readonly NotebookCell[], base: string): CellModule {
  const imports = new Map<string, Import>();
  const blocks = cells.filter(({ type }) => type === "code").map((cell) => ({
    cell: cell.number,
    lines: withoutModuleSyntax(cell, { imports, base }).split("\n"),
  }));

  const lines: string[] = [];
  const origins: (Origin | undefined)[] = [];
  const add = (text: string, origin?: Origin) => {
    lines.push(text);
    origins.push(origin);
  };
  add("export {};");
  for (const { from, origin, named, whole } of imports.values()) {
    for (const { text, origin } of whole.values()) add(`${text} ${from};`, { ...origin, at: 1 });
    if (named.size === 0) continue;
    add("import {", { ...origin, at: 1 });
    for (const { text, typeOnly, origin } of named.values()) {
      // The name itself keeps its place; `type` may have stood before the braces.
      const prefix = typeOnly ? "  type " : "  ";
      add(`${prefix}${text},`, { ...origin, at: prefix.length + 1 });
    }
    add(`} from ${from};`, { ...origin, at: "} from ".length + 1 });
  }
  for (const { cell, lines } of blocks) {
    add("{", { cell, line: 1, column: 1, at: 1 });
    for (const [i, line] of lines.entries()) add(line, { cell, line: i + 1, column: 1, at: 1 });
  }
  add("}".repeat(blocks.length));
  return {
    text: lines.join("\n") + "\n",
    placeOf(line, column) {
      const origin = origins[line - 1];
      if (origin === undefined) return undefined;
      const { cell, line: cellLine, column: start, at } = origin;
      return { cell, line: cellLine, column: Math.max(1, column - at + start) };
    },
  };
}

/** The cell's source with imports and `export` blanked out; the imports are added to `imports`. */
function withoutModuleSyntax(
  { source, number }: NotebookCell,
  { imports, base }: { imports: Map<string, Import>; base: string },
): string {
  const file = ts.createSourceFile("cell.ts", source, ts.ScriptTarget.ESNext, true);
  let text = source;
  const blank = (from: number, to: number) => {
    text = text.slice(0, from) + text.slice(from, to).replace(/[^\n\r]/g, " ") + text.slice(to);
  };
  for (const statement of file.statements) {
    const start = statement.getStart(file);
    if (ts.isImportDeclaration(statement)) {
      collect(statement, { imports, base, cell: number });
      blank(start, statement.end);
    } else if (ts.isExportDeclaration(statement)) blank(start, statement.end);
    else if (ts.isExportAssignment(statement)) blank(start, statement.expression.getStart(file));
    else if (ts.canHaveModifiers(statement)) {
      for (const modifier of ts.getModifiers(statement) ?? []) {
        const { kind } = modifier;
        if (kind === ts.SyntaxKind.ExportKeyword || kind === ts.SyntaxKind.DefaultKeyword) {
          blank(modifier.getStart(file), modifier.end);
        }
      }
    }
  }
  return text;
}

function collect(
  statement: ts.ImportDeclaration,
  { imports, base, cell }: { imports: Map<string, Import>; base: string; cell: number },
): void {
  const file = statement.getSourceFile();
  const placeOf = (node: ts.Node): CellPlace => {
    const { line, character } = file.getLineAndCharacterOfPosition(node.getStart(file));
    return { cell, line: line + 1, column: character + 1 };
  };
  const { moduleSpecifier, attributes, importClause: clause } = statement;
  const name = ts.isStringLiteral(moduleSpecifier) ? moduleSpecifier.text : "";
  const target = /^\.{0,2}\//.test(name) ? new URL(name, base).href : name;
  const from = JSON.stringify(target) +
    (attributes === undefined ? "" : ` ${attributes.getText(file)}`);
  let entry = imports.get(from);
  if (entry === undefined) {
    entry = { from, origin: placeOf(moduleSpecifier), named: new Map(), whole: new Map() };
    imports.set(from, entry);
  }
  const put = (list: Map<string, Specifier>, specifier: Specifier) => {
    const known = list.get(specifier.text);
    // A name imported as a type in one cell and as a value in another is a value.
    if (known === undefined) list.set(specifier.text, specifier);
    else if (known.typeOnly && !specifier.typeOnly) {
      list.set(specifier.text, { ...known, typeOnly: false });
    }
  };
  if (clause === undefined) {
    put(entry.whole, { text: "import", typeOnly: false, origin: placeOf(statement) });
    return;
  }
  const allTypes = clause.phaseModifier === ts.SyntaxKind.TypeKeyword;
  if (clause.name !== undefined) {
    const text = `default as ${clause.name.text}`;
    put(entry.named, { text, typeOnly: allTypes, origin: placeOf(clause.name) });
  }
  const bindings = clause.namedBindings;
  if (bindings !== undefined && ts.isNamespaceImport(bindings)) {
    const text = `import ${allTypes ? "type " : ""}* as ${bindings.name.text} from`;
    put(entry.whole, { text, typeOnly: allTypes, origin: placeOf(statement) });
  } else if (bindings !== undefined) {
    for (const element of bindings.elements) {
      const imported = element.propertyName;
      const text = (imported === undefined ? "" : `${imported.getText(file)} as `) +
        element.name.text;
      const typeOnly = allTypes || element.isTypeOnly;
      put(entry.named, { text, typeOnly, origin: placeOf(imported ?? element.name) });
    }
  }
}
