/** Assertions of the tests: thin names over `node:assert`, and one numeric comparison. */
import nodeAssert from "node:assert/strict";

export function assert(condition: unknown, message?: string): asserts condition {
  nodeAssert.ok(condition, message);
}

export function assertEquals<T>(actual: T, expected: T, message?: string): void {
  nodeAssert.deepStrictEqual(actual, expected, message);
}

/** Asserts that `action` throws an instance of `kind` whose message matches `wording`. */
export function assertThrows(
  action: () => unknown,
  kind: new (...args: never[]) => Error,
  wording: RegExp,
): void {
  nodeAssert.throws(action, (error: unknown) => {
    nodeAssert.ok(error instanceof kind, `expected ${kind.name}, got ${String(error)}`);
    nodeAssert.match(error.message, wording);
    return true;
  });
}

/** Asserts that `action` rejects with an instance of `kind` whose message matches `wording`. */
export async function assertRejects(
  action: () => Promise<unknown>,
  kind: new (...args: never[]) => Error,
  wording: RegExp,
): Promise<void> {
  await nodeAssert.rejects(action, (error: unknown) => {
    nodeAssert.ok(error instanceof kind, `expected ${kind.name}, got ${String(error)}`);
    nodeAssert.match(error.message, wording);
    return true;
  });
}

/**
 * Asserts |actual - expected| <= atol + rtol |expected|, entry by entry for arrays; the failure names
 * the worst entry.
 */
export function assertClose(
  actual: number | ArrayLike<number>,
  expected: number | ArrayLike<number>,
  { rtol, atol, what = "value" }: { rtol: number; atol: number; what?: string },
): void {
  const a = typeof actual === "number" ? [actual] : Array.from(actual);
  const e = typeof expected === "number" ? [expected] : Array.from(expected);
  nodeAssert.equal(a.length, e.length, `${what}: expected ${e.length} entries, found ${a.length}`);
  let worst = -1;
  let excess = 0;
  for (let i = 0; i < a.length; i++) {
    const bound = atol + rtol * Math.abs(e[i]!);
    const ratio = Math.abs(a[i]! - e[i]!) / bound;
    if (!(ratio <= 1) && !(ratio <= excess)) {
      excess = ratio;
      worst = i;
    }
  }
  if (worst >= 0) {
    nodeAssert.fail(
      `${what}[${worst}]: expected ${e[worst]}, got ${a[worst]}, off by ${
        Math.abs(a[worst]! - e[worst]!)
      } = ${excess} times the bound (rtol ${rtol}, atol ${atol})`,
    );
  }
}
