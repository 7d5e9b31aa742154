import { assemble } from "../../../lib/circuit/circuit.ts";
import { coilElements } from "../../../lib/circuit/coil_elements.ts";
import { type CircuitElement, type DeviceElement, GROUND } from "../../../lib/circuit/element.ts";
import { coilFromFigures } from "../../../lib/device/inductor_from_figures.ts";
import { coilModel } from "../../../lib/device/inductor_model.ts";
import { findEquilibrium } from "../../../lib/orbit/equilibrium.ts";
import { findOrbit } from "../../../lib/orbit/find_orbit.ts";
import { Orbit } from "../../../lib/orbit/orbit.ts";
import { phaseDiffusion } from "../../../lib/orbit/phase_diffusion.ts";
import { assert, assertClose, assertThrows } from "../../assert.ts";

const INDUCTANCE = 1.5e-9;
const FREQUENCY = 5e9;
const QUALITY = 15;
const CAPACITANCE = 1 / ((2 * Math.PI * FREQUENCY) ** 2 * INDUCTANCE);
const PLACE = { plus: "plus", minus: "minus", frequency: FREQUENCY, temperature: 300 };

const conductor: DeviceElement = {
  kind: "device",
  name: "conductor",
  nodes: ["plus", "minus"],
  noise: [],
  evaluate(v, out) {
    const t = Math.tanh((v[0]! - v[1]!) / 0.3);
    const slope = -2e-3 / 0.3 * (1 - t * t);
    out.fill(0);
    out.set([-2e-3 * t, 2e-3 * t, slope, -slope, -slope, slope]);
  },
};

function orbitWith(coil: readonly CircuitElement[]) {
  const circuit = assemble([
    ...coil,
    {
      kind: "capacitor",
      name: "tank capacitor",
      nodes: ["plus", "minus"],
      capacitance: CAPACITANCE,
    },
    // The common mode needs a path and a capacitance of its own, small enough to stay out of the tank.
    { kind: "capacitor", name: "plus stray", nodes: ["plus", GROUND], capacitance: 2e-15 },
    { kind: "capacitor", name: "minus stray", nodes: ["minus", GROUND], capacitance: 2e-15 },
    {
      kind: "resistor",
      name: "plus rail",
      nodes: ["plus", GROUND],
      resistance: 1e6,
      temperature: 0,
    },
    {
      kind: "resistor",
      name: "minus rail",
      nodes: ["minus", GROUND],
      resistance: 1e6,
      temperature: 0,
    },
    conductor,
  ]);
  const orbit = findOrbit(circuit.system, { start: findEquilibrium(circuit.system) });
  assert(orbit instanceof Orbit, "no orbit");
  const { re, im } = orbit.phasor((x) => circuit.voltage("plus", "minus", x));
  return {
    frequency: orbit.frequency,
    amplitude: Math.hypot(re, im),
    diffusion: phaseDiffusion(orbit, circuit.sources).total,
  };
}

Deno.test("coilElements: a series loss acts as its parallel equivalent to the order 1/Q^2", () => {
  const coil = coilFromFigures({
    inductance: INDUCTANCE,
    quality: QUALITY,
    frequency: FREQUENCY,
    excitation: "differential",
  });
  const series = orbitWith(coilElements("coil", coil, PLACE));
  const parallel = orbitWith([
    {
      kind: "inductor",
      name: "coil",
      windings: [{ nodes: ["plus", "minus"], inductance: INDUCTANCE, seriesResistance: 0 }],
      coupling: 0,
      temperature: 0,
    },
    {
      kind: "resistor",
      name: "loss",
      nodes: ["plus", "minus"],
      resistance: QUALITY * 2 * Math.PI * FREQUENCY * INDUCTANCE,
      temperature: 300,
    },
  ]);
  const order = 1 / QUALITY ** 2;
  assertClose(series.frequency, parallel.frequency, { rtol: order, atol: 0, what: "frequency" });
  assertClose(series.amplitude, parallel.amplitude, {
    rtol: 2 * order,
    atol: 0,
    what: "amplitude",
  });
  assertClose(series.diffusion, parallel.diffusion, {
    rtol: 8 * order,
    atol: 0,
    what: "diffusion",
  });
});

Deno.test("coilElements: the silicon under the ends takes amplitude and adds noise", () => {
  const bare = {
    inductance: INDUCTANCE,
    seriesResistance: () => 2 * Math.PI * FREQUENCY * INDUCTANCE / QUALITY,
    parallelCapacitance: 5e-15,
    coupling: 0.6,
  };
  const substrate = {
    oxideCapacitance: 60e-15,
    siliconResistance: 400,
    siliconCapacitance: 30e-15,
  };
  const place = { ...PLACE, tap: GROUND };
  const options = { origin: "figures", excitation: "differential" } as const;
  const clean = orbitWith(coilElements("coil", coilModel(bare, options), place));
  const lossy = orbitWith(
    coilElements("coil", coilModel({ ...bare, substrate }, options), place),
  );
  assert(lossy.amplitude < clean.amplitude);
  assert(lossy.frequency < clean.frequency);
  assert(lossy.diffusion > clean.diffusion);
});

Deno.test("coilElements asks for the node of a centre tap", () => {
  const tapped = coilModel({
    inductance: INDUCTANCE,
    seriesResistance: () => 1,
    parallelCapacitance: 0,
    coupling: 0.5,
  }, { origin: "figures", excitation: "differential" });
  assertThrows(() => coilElements("coil", tapped, PLACE), RangeError, /it has a centre tap/);
});
