import ts from "typescript";
import type { SourceFile } from "./source_tree.ts";

/** Files without a test of their own, each with the reason. An entry that is not needed is a fault. */
const TESTED_OTHERWISE: Readonly<Record<string, string>> = {};

/**
 * Every file of lib/, kernel/ and reports/ that no test reaches directly.
 *
 * A file is tested when tests/ mirrors it (`tests/lib/noise/mask_test.ts` for `lib/noise/mask.ts`) or
 * when a file of tests/ imports it by path. A file whose name begins with `_` is also tested through a
 * tested file of its folder that imports it. A mod.ts, and a file of types only, needs no test.
 */
export function findUntestedFiles(
  files: readonly SourceFile[],
  exceptions: Readonly<Record<string, string>> = TESTED_OTHERWISE,
): string[] {
  const paths = new Set(files.map((file) => file.path));
  const imported = new Set(
    files.filter((file) => file.path.startsWith("tests/")).flatMap((file) =>
      file.imports.map((entry) => entry.target)
    ),
  );
  const isTested = (path: string) => imported.has(path) || paths.has(mirrorOf(path));
  const sources = files.filter((file) =>
    /^(lib|kernel|reports)\//.test(file.path) && !file.path.endsWith("/mod.ts") &&
    !file.path.endsWith(".d.ts") && !isTypesOnly(file.ast)
  );
  const findings: string[] = [];
  const untested = new Set<string>();
  for (const { path } of sources) {
    if (isTested(path) || (isPrivate(path) && isTestedThroughNeighbour(path, files, isTested))) {
      continue;
    }
    untested.add(path);
    if (path in exceptions) continue;
    findings.push(`${path}:1: has no test; write ${mirrorOf(path)}`);
  }
  for (const path of Object.keys(exceptions)) {
    if (!untested.has(path)) {
      findings.push(`${path}:1: is excused from a test in tools/structure/ but needs no excuse`);
    }
  }
  return findings;
}

function mirrorOf(path: string): string {
  return `tests/${path.replace(/\.ts$/, "_test.ts")}`;
}

function isPrivate(path: string): boolean {
  return /\/_[^/]*$/.test(path);
}

/** Whether a file of the folder that is tested, itself or through another neighbour, imports `path`. */
function isTestedThroughNeighbour(
  path: string,
  files: readonly SourceFile[],
  isTested: (path: string) => boolean,
  seen: ReadonlySet<string> = new Set(),
): boolean {
  const folder = path.slice(0, path.lastIndexOf("/") + 1);
  const visited = new Set([...seen, path]);
  return files.some((file) =>
    file.path.startsWith(folder) && !visited.has(file.path) &&
    file.imports.some((entry) => entry.target === path) &&
    (isTested(file.path) ||
      (isPrivate(file.path) && isTestedThroughNeighbour(file.path, files, isTested, visited)))
  );
}

function isTypesOnly(ast: ts.SourceFile): boolean {
  return ast.statements.every((statement) =>
    ts.isInterfaceDeclaration(statement) || ts.isTypeAliasDeclaration(statement) ||
    (ts.isImportDeclaration(statement) && statement.importClause?.isTypeOnly) ||
    (ts.isExportDeclaration(statement) && statement.isTypeOnly)
  );
}
