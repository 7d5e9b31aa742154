import { Transient } from "../../lib/orbit/transient.ts";
import { ChargeCoordinates } from "../../lib/orbit/charge_coordinates.ts";
import { gaussMethod } from "../../lib/numeric/gauss.ts";
import { odeSystem } from "../../lib/orbit/ode_system.ts";
const system = odeSystem({
  dimension: 2,
  flow: ([x, y], into) => {
    into[0] = 1 + x! * x!;
    into[1] = -y!;
  },
});
const start = Float64Array.of(0, 1);
const c = new ChargeCoordinates(system, start);
const t = new Transient(c, gaussMethod(3), {
  start,
  charges: start.slice(),
  firstStep: 1e-2,
  longestStep: Infinity,
});
for (let k = 1; k < 400; k++) {
  const o = t.nextCycle(k);
  if (k % 10 == 0) console.log(k, o.status, t.stepper.stages);
  if (o.status == "at rest") break;
}
