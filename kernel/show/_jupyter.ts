/** What of `Deno.jupyter` the house uses. */
export interface Jupyter {
  broadcast(type: string, content: Record<string, unknown>): Promise<void>;
}

/** The kernel's side of Jupyter, or undefined outside a kernel, where merely reading it throws. */
export function jupyter(): Jupyter | undefined {
  try {
    return Deno.jupyter;
  } catch {
    return undefined;
  }
}
