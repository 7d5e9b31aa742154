import ts from "typescript";
import { LINE_VARIABLE } from "./kernel_setup.ts";

/** A syntax error with its place, both from 1. */
export interface SyntaxProblem {
  readonly line: number;
  readonly column: number;
  readonly message: string;
}

/** Statements that do nothing when they are reached, and blocks, which the kernel may read as objects. */
const UNMARKED: ReadonlySet<ts.SyntaxKind> = new Set([
  ts.SyntaxKind.FunctionDeclaration,
  ts.SyntaxKind.InterfaceDeclaration,
  ts.SyntaxKind.TypeAliasDeclaration,
  ts.SyntaxKind.EmptyStatement,
  ts.SyntaxKind.Block,
]);

/** The first syntax error of a cell's source, if it has one. */
export function findSyntaxProblem(source: string): SyntaxProblem | undefined {
  const bare = source.trim();
  // The kernel takes `{ a: 1, b: 2 }` for an object, as a person means it.
  const wrapped = bare.startsWith("{") && !bare.endsWith(";") &&
    problemsOf(`(${source}\n)`).length === 0;
  const problem = wrapped ? undefined : problemsOf(source)[0];
  if (problem === undefined) return undefined;
  const { line, character } = ts.getLineAndCharacterOfPosition(
    parse(source),
    Math.min(problem.start ?? 0, source.length),
  );
  return {
    line: line + 1,
    column: character + 1,
    message: ts.flattenDiagnosticMessageText(problem.messageText, " "),
  };
}

/**
 * The same source with the number of its line stored before each top-level statement, on that line,
 * so that a mark after a failure tells where it was. The kernel's own stack counts lines of what it
 * made of the cell.
 */
export function withLineMarks(source: string): string {
  const file = parse(source);
  let marked = "";
  let from = 0;
  for (const statement of file.statements) {
    if (UNMARKED.has(statement.kind)) continue;
    const start = statement.getStart(file);
    const { line } = file.getLineAndCharacterOfPosition(start);
    // A `var` leaves the value of the cell alone; an assignment would become it before a `const`.
    marked += `${source.slice(from, start)}var ${LINE_VARIABLE}=${line + 1};`;
    from = start;
  }
  return marked + source.slice(from);
}

function problemsOf(source: string): readonly ts.Diagnostic[] {
  const { diagnostics } = ts.transpileModule(source, {
    reportDiagnostics: true,
    fileName: "cell.ts",
    compilerOptions: { target: ts.ScriptTarget.ESNext, module: ts.ModuleKind.ESNext },
  });
  return diagnostics ?? [];
}

function parse(source: string): ts.SourceFile {
  return ts.createSourceFile("cell.ts", source, ts.ScriptTarget.ESNext, false, ts.ScriptKind.TS);
}
