/** A file that a report depends on. */
export interface InputFile {
  /** Name without folders, so that the hash does not depend on where things are. */
  readonly file: string;
  readonly text: string;
}

/** SHA-256 of a text in UTF-8, hex; line ends count as one character however they are stored. */
export async function textHash(text: string): Promise<string> {
  const bytes = new TextEncoder().encode(text.replaceAll("\r\n", "\n"));
  return new Uint8Array(await crypto.subtle.digest("SHA-256", bytes)).toHex();
}

/** SHA-256 over Tankwright's version and the texts of revision, card and templates, in this order. */
export async function inputHash(version: string, texts: readonly string[]): Promise<string> {
  const hashes = await Promise.all(texts.map(textHash));
  return await textHash(["tankwright", version, ...hashes].join("\n"));
}
