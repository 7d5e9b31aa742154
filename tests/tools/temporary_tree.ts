/** Writes `files` (path to text) below a new folder, hands it to `use` and removes it afterwards. */
export async function withTree<T>(
  files: Readonly<Record<string, string>>,
  use: (root: string) => T | Promise<T>,
): Promise<T> {
  const root = await Deno.makeTempDir();
  try {
    for (const [path, text] of Object.entries(files)) {
      await Deno.mkdir(`${root}/${path}`.replace(/\/[^/]*$/, ""), { recursive: true });
      await Deno.writeTextFile(`${root}/${path}`, text);
    }
    return await use(root);
  } finally {
    await Deno.remove(root, { recursive: true });
  }
}
