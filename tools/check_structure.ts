/** Checks the arrows between the folders, the mod.ts lists and that every file has a test. */
import { findForbiddenArrows } from "./structure/arrows.ts";
import { findCycles } from "./structure/cycles.ts";
import { findErrorFaults } from "./structure/error_faults.ts";
import { findLongFiles } from "./structure/long_files.ts";
import { findModuleListFaults } from "./structure/module_lists.ts";
import { findImpurities } from "./structure/pure_library.ts";
import { readSourceTree } from "./structure/source_tree.ts";
import { findUntestedFiles } from "./structure/untested_files.ts";
import { finish, projectRoot } from "./findings.ts";

/**
 * Every fault in the structure of the tree at `root`, one line each.
 *
 * @param longFiles files that may be long, with the reason; this project's own without it
 */
export function checkStructure(
  root: string,
  { longFiles }: { readonly longFiles?: Readonly<Record<string, string>> } = {},
): string[] {
  const files = readSourceTree(root);
  if (files.length === 0) return [`${root}: holds no TypeScript file`];
  return [
    ...findForbiddenArrows(files),
    ...findCycles(files),
    ...findImpurities(files),
    ...findModuleListFaults(files),
    ...findUntestedFiles(files),
    ...findErrorFaults(files),
    ...findLongFiles(files, longFiles),
  ];
}

if (import.meta.main) finish(checkStructure(projectRoot()));
