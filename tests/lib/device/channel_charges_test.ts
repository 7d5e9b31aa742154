import { assert, assertClose } from "../../assert.ts";
import { channelCharges } from "../../../lib/device/_channel_charges.ts";
import { derivative } from "./_biases.ts";

const out = new Float64Array(6);
const pairs = [[5, 2], [2, 5], [40, 1e-9], [1e-3, 1e-6], [0.3, 0.2], [12, 11.5]] as const;

/** Gauss-Legendre with three points: exact for the quartic integrands below. */
function integral(f: (q: number) => number, from: number, to: number): number {
  const half = (to - from) / 2;
  const middle = (to + from) / 2;
  const node = Math.sqrt(3 / 5);
  return half * (5 * f(middle - node * half) + 8 * f(middle) + 5 * f(middle + node * half)) / 9;
}

Deno.test("channelCharges are the integrals of charge along the channel, weighted by position", () => {
  for (const [qs, qd] of pairs) {
    channelCharges(qs, qd, out);
    const flow = qs * qs + qs - qd * qd - qd;
    const place = (q: number) => (qs * qs + qs - q * q - q) / flow;
    const length = (q: number) => (2 * q + 1) / flow;
    const drain = integral((q) => place(q) * q * length(q), qd, qs);
    const source = integral((q) => (1 - place(q)) * q * length(q), qd, qs);
    assertClose(out[0]!, drain, { rtol: 1e-12, atol: 0 });
    assertClose(out[1]!, source, { rtol: 1e-12, atol: 0 });
  }
});

Deno.test("channelCharges give half the charge to each end without drain-source voltage", () => {
  for (const q of [1e-12, 0.1, 30]) {
    channelCharges(q, q, out);
    assertClose([out[0]!, out[1]!], [q / 2, q / 2], { rtol: 1e-14, atol: 0 });
  }
});

Deno.test("channelCharges swap with the ends, to the last bit", () => {
  for (const [qs, qd] of pairs) {
    channelCharges(qs, qd, out);
    const swapped = new Float64Array(6);
    channelCharges(qd, qs, swapped);
    assert([1, 0, 5, 4, 3, 2].every((k, i) => out[i] === swapped[k]));
  }
});

Deno.test("channelCharges give the derivatives of the shares", () => {
  for (const [qs, qd] of pairs) {
    const share = (k: number, s: number, d: number) => {
      channelCharges(s, d, out);
      return out[k]!;
    };
    const h = 1e-2 * Math.min(1, qd);
    const expected = [
      derivative((s) => share(0, s, qd), qs, 1e-2 * Math.min(1, qs)),
      derivative((d) => share(0, qs, d), qd, h),
      derivative((s) => share(1, s, qd), qs, 1e-2 * Math.min(1, qs)),
      derivative((d) => share(1, qs, d), qd, h),
    ];
    channelCharges(qs, qd, out);
    // The shares' rounding over the step: large where qd is small against qs.
    assertClose(out.subarray(2), expected, { rtol: 1e-9, atol: 1e-15 * qs / h });
  }
});
