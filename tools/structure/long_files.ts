import type { SourceFile } from "./source_tree.ts";

const MOST_LINES = 400;

/** Files that are longer, each with the reason. An entry that is not needed is a fault. */
const JUSTIFIED: Readonly<Record<string, string>> = {
  "lib/mod.ts": "a list of names, one a line",
  "lib/orbit/period_map.ts": "one hot path whose passes share preallocated private arrays",
};

/** Every file above 400 lines that is not justified by name. */
export function findLongFiles(
  files: readonly SourceFile[],
  justified: Readonly<Record<string, string>> = JUSTIFIED,
): string[] {
  const long = files.filter((file) => file.ast.getLineStarts().length - 1 > MOST_LINES);
  const paths = new Set(long.map((file) => file.path));
  return [
    ...long.filter((file) => !(file.path in justified)).map((file) =>
      `${file.path}:1: has ${
        file.ast.getLineStarts().length - 1
      } lines, more than ${MOST_LINES}; ` +
      "split it, or justify it in tools/structure/long_files.ts"
    ),
    ...Object.keys(justified).filter((path) => !paths.has(path)).map((path) =>
      `${path}:1: is justified as a long file but is not long`
    ),
  ];
}
