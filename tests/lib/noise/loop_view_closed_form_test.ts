import { assertClose, assertThrows } from "../../assert.ts";
import { firstOrderLoop } from "../../../lib/noise/loop_view.ts";
import { firstOrderPhaseError } from "../../../lib/noise/loop_view_closed_form.ts";
import { integrateLockedNoise } from "../../../lib/noise/loop_view_locked_noise.ts";

Deno.test("firstOrderPhaseError: the integral between far limits agrees to 1e-6", () => {
  const closed = firstOrderPhaseError(-115, { offset: 1e6, bandwidth: 2e5 });
  const { total } = integrateLockedNoise({ oscillator: { inverseSquare: 10 ** 0.5 } }, {
    loop: firstOrderLoop(2e5),
    // What lies outside is (2/pi) 2e-7 of the variance.
    from: 2e5 * 1e-7,
    to: 2e5 * 1e7,
  });
  assertClose(total.phaseError, closed, { rtol: 1e-6, atol: 0 });
});

Deno.test("firstOrderPhaseError: bad values are refused", () => {
  const of = (level: number, offset: number, bandwidth: number) => () =>
    firstOrderPhaseError(level, { offset, bandwidth });
  assertThrows(of(NaN, 1e6, 1e5), RangeError, /level/);
  assertThrows(of(-100, 0, 1e5), RangeError, /offset must be > 0 Hz/);
  assertThrows(of(-100, 1e6, -1), RangeError, /bandwidth must be > 0 Hz/);
});
