import ts from "typescript";

/** One import, re-export or dynamic import of a file. */
export interface SourceImport {
  readonly specifier: string;
  /** Path of the imported file from the root, when it lies inside the tree. */
  readonly target?: string;
  /** 1-based. */
  readonly line: number;
}

/** A TypeScript file of the tree, parsed. */
export interface SourceFile {
  /** Path from the root, with forward slashes. */
  readonly path: string;
  readonly ast: ts.SourceFile;
  readonly imports: readonly SourceImport[];
}

/** The top folders that hold source. */
const FOLDERS = ["lib", "kernel", "reports", "notebooks", "tests", "tools", "bench"];
const NOT_SOURCE = new Set([".git", "node_modules", "data", "out", ".ipynb_checkpoints"]);

/**
 * Reads and parses every TypeScript file under `root`, in order of path.
 *
 * @throws {SyntaxError} when deno.json is not JSON
 */
export function readSourceTree(root: string): SourceFile[] {
  const aliases = readAliases(root);
  const paths = FOLDERS.flatMap((folder) => listFiles(root, folder)).filter((path) =>
    path.endsWith(".ts")
  ).sort();
  return paths.map((path) => parseFile(path, Deno.readTextFileSync(`${root}/${path}`), aliases));
}

/** Every file below `folder` of `root`, as paths from the root; none when there is no such folder. */
export function listFiles(root: string, folder: string): string[] {
  const found: string[] = [];
  try {
    for (const entry of Deno.readDirSync(`${root}/${folder}`)) {
      if (NOT_SOURCE.has(entry.name)) continue;
      const path = folder === "." ? entry.name : `${folder}/${entry.name}`;
      if (entry.isDirectory) found.push(...listFiles(root, path));
      else if (entry.isFile) found.push(path);
    }
  } catch (error) {
    if (!(error instanceof Deno.errors.NotFound)) throw error;
  }
  return found;
}

/** 1-based line of a node. */
export function lineOf(ast: ts.SourceFile, node: ts.Node): number {
  return ast.getLineAndCharacterOfPosition(node.getStart(ast)).line + 1;
}

/** The import map's entries that point into the tree. */
function readAliases(root: string): ReadonlyMap<string, string> {
  const config: { imports?: Record<string, string> } = JSON.parse(
    Deno.readTextFileSync(`${root}/deno.json`),
  );
  const inside = Object.entries(config.imports ?? {}).filter(([, to]) => to.startsWith("./"));
  return new Map(inside.map(([name, to]) => [name, to.slice("./".length)]));
}

function parseFile(
  path: string,
  text: string,
  aliases: ReadonlyMap<string, string>,
): SourceFile {
  const ast = ts.createSourceFile(path, text, ts.ScriptTarget.Latest, true);
  const imports: SourceImport[] = [];
  const add = (literal: ts.Node | undefined) => {
    if (!literal || !ts.isStringLiteralLike(literal)) return;
    const specifier = literal.text;
    const target = aliases.get(specifier) ?? resolveRelative(path, specifier);
    const line = lineOf(ast, literal);
    imports.push(target === undefined ? { specifier, line } : { specifier, target, line });
  };
  const visit = (node: ts.Node) => {
    if (ts.isImportDeclaration(node) || ts.isExportDeclaration(node)) add(node.moduleSpecifier);
    if (ts.isImportTypeNode(node) && ts.isLiteralTypeNode(node.argument)) {
      add(node.argument.literal);
    }
    if (ts.isCallExpression(node) && node.expression.kind === ts.SyntaxKind.ImportKeyword) {
      add(node.arguments[0]);
    }
    if (isModuleUrl(node)) add(node.arguments?.[0]);
    ts.forEachChild(node, visit);
  };
  visit(ast);
  return { path, ast, imports };
}

/** Whether a node is `new URL("./x.ts", import.meta.url)`, which is how a worker names its module. */
function isModuleUrl(node: ts.Node): node is ts.NewExpression {
  if (!ts.isNewExpression(node) || node.expression.getText() !== "URL") return false;
  const [where, base] = node.arguments ?? [];
  return base?.getText() === "import.meta.url" && where !== undefined &&
    ts.isStringLiteralLike(where) && where.text.endsWith(".ts");
}

function resolveRelative(from: string, specifier: string): string | undefined {
  if (!specifier.startsWith(".")) return undefined;
  return new URL(specifier, `file:///${from}`).pathname.slice(1);
}
