import ts from "typescript";
import { exportedSymbols } from "./exported_symbols.ts";
import { lineOf, type SourceFile } from "./source_tree.ts";

/** Floors of lib/ that lib/mod.ts need not repeat: machinery for the floors above. */
const NOT_FOR_USERS = ["lib/numeric/mod.ts"];

/**
 * What is wrong with the mod.ts files and their use.
 *
 * A mod.ts is only an explicit list of named re-exports. In lib/ every folder has one, and it lists
 * every symbol its folder's files export, except those of files whose name begins with `_` and those
 * with the tag `@internal` in their doc comment; lib/mod.ts lists what its floors list. Elsewhere
 * (kernel/mod.ts) the list is chosen by hand. Code in lib/, kernel/ and reports/ imports the file that
 * declares a symbol, never a mod.ts.
 */
export function findModuleListFaults(files: readonly SourceFile[]): string[] {
  return [
    ...files.flatMap(findModImports),
    ...files.flatMap(findOtherStatements),
    ...findGaps(files),
  ];
}

function isMod(path: string): boolean {
  return path.endsWith("/mod.ts");
}

function findModImports({ path, imports }: SourceFile): string[] {
  if (!/^(lib|kernel|reports)\//.test(path) || isMod(path)) return [];
  return imports.filter((entry) => entry.target !== undefined && isMod(entry.target)).map((entry) =>
    `${path}:${entry.line}: imports "${entry.specifier}", but internal code imports the file that ` +
    "declares the symbol"
  );
}

function findOtherStatements({ path, ast }: SourceFile): string[] {
  if (!isMod(path)) return [];
  return ast.statements.filter((statement) =>
    !(ts.isExportDeclaration(statement) && statement.moduleSpecifier && statement.exportClause &&
      ts.isNamedExports(statement.exportClause))
  ).map((statement) =>
    `${path}:${lineOf(ast, statement)}: a mod.ts holds only lists of named re-exports`
  );
}

function findGaps(files: readonly SourceFile[]): string[] {
  const findings: string[] = [];
  const byPath = new Map(files.map((file) => [file.path, file]));
  const folders = new Set(
    files.filter((file) => file.path.startsWith("lib/")).map((file) => folderOf(file.path)),
  );
  for (const folder of folders) {
    const mod = byPath.get(`${folder}/mod.ts`);
    const members = files.filter((file) => isMemberOf(folder, file.path));
    if (members.length === 0) continue;
    if (!mod) {
      findings.push(`${folder}/mod.ts:1: missing; every folder of lib/ lists its public symbols`);
      continue;
    }
    const listed = listedSymbols(mod);
    for (const member of members) {
      for (const { name, internal, line } of exportedSymbols(member)) {
        const isListed = listed.get(member.path)?.has(name) ?? false;
        if (!internal && !isListed) {
          findings.push(
            `${member.path}:${line}: exports ${name}, which ${folder}/mod.ts does not list; list ` +
              "it, or mark it @internal",
          );
        }
        if (internal && isListed) {
          findings.push(
            `${member.path}:${line}: ${name} is @internal, yet ${folder}/mod.ts lists it`,
          );
        }
      }
    }
  }
  return findings;
}

/** Whether `path` is a public file directly in `folder`; for lib itself, the mod.ts of a floor. */
function isMemberOf(folder: string, path: string): boolean {
  if (folder === "lib" && /^lib\/[^/]+\/mod\.ts$/.test(path)) return !NOT_FOR_USERS.includes(path);
  return folderOf(path) === folder && !isMod(path) && !fileName(path).startsWith("_");
}

/** Original names a mod.ts takes from each file. */
function listedSymbols(mod: SourceFile): ReadonlyMap<string, ReadonlySet<string>> {
  const listed = new Map<string, Set<string>>();
  for (const statement of mod.ast.statements) {
    if (!ts.isExportDeclaration(statement) || !statement.exportClause) continue;
    const from = statement.moduleSpecifier;
    if (!from || !ts.isStringLiteral(from) || !ts.isNamedExports(statement.exportClause)) continue;
    const target = mod.imports.find((entry) => entry.specifier === from.text)?.target;
    if (target === undefined) continue;
    const names = listed.get(target) ?? new Set();
    for (const element of statement.exportClause.elements) {
      names.add((element.propertyName ?? element.name).text);
    }
    listed.set(target, names);
  }
  return listed;
}

function folderOf(path: string): string {
  return path.slice(0, path.lastIndexOf("/"));
}

function fileName(path: string): string {
  return path.slice(path.lastIndexOf("/") + 1);
}
