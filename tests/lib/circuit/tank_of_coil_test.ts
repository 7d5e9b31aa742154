import { crossCoupledPair } from "../../../lib/circuit/cross_coupled_pair.ts";
import { tankOfCoil } from "../../../lib/circuit/tank_of_coil.ts";
import type { TankDesign } from "../../../lib/circuit/topology.ts";
import { coilFromGeometry } from "../../../lib/device/inductor_from_geometry.ts";
import { coilFromNetwork } from "../../../lib/device/inductor_from_network.ts";
import { coilAdmittance } from "../../../lib/device/inductor_network.ts";
import type { CoilModel } from "../../../lib/device/inductor_model.ts";
import { BULK_METALS } from "../../../lib/device/skin_metal.ts";
import { networkFromAdmittance } from "../../../lib/device/touchstone_network.ts";
import { readTouchstone } from "../../../lib/device/touchstone_read.ts";
import { writeTouchstone } from "../../../lib/device/touchstone_write.ts";
import { operatingFigures } from "../../../lib/design/operating_figures.ts";
import { oscillation } from "../../../lib/design/oscillation.ts";
import { startup } from "../../../lib/design/startup.ts";
import { Orbit } from "../../../lib/orbit/orbit.ts";
import { assert, assertClose, assertThrows } from "../../assert.ts";
import { illustrativeCard } from "../device/_card.ts";

const FREQUENCY = 5e9;
/** Of the devices between the outputs, about [F]. */
const DEVICES = 40e-15;
const card = illustrativeCard();

/** The tank of a coil, tuned to about the frequency at which the coil is described. */
function tuned(coil: CoilModel): TankDesign {
  const whole = 1 / ((2 * Math.PI * FREQUENCY) ** 2 * coil.inductance(FREQUENCY));
  return tankOfCoil(coil, { frequency: FREQUENCY, capacitance: whole - DEVICES });
}

const condition = {
  corner: "typical",
  temperature: card.temperature.nominal,
  supply: 0.8,
} as const;

/** An octagonal coil of two turns over a lossy substrate; the sizes are invented. */
function drawn(excitation: "differential" | "single_ended" = "differential"): CoilModel {
  return coilFromGeometry(
    { shape: "octagonal", turns: 2, width: 12e-6, spacing: 3e-6, outerDiameter: 260e-6 },
    {
      metal: BULK_METALS.copper,
      metalThickness: 3e-6,
      bridgeOxide: 1e-6,
      substrateOxide: 6e-6,
      substrateCapacitance: 1.6e-6,
      substrateConductance: 4e4,
    },
    { excitation, temperature: card.temperature.nominal },
  );
}

function solve(tank: TankDesign) {
  const oscillator = crossCoupledPair.build({
    tank,
    pair: { width: 30e-6, length: 60e-9 },
    tail: { width: 60e-6, length: 180e-9 },
    current: 2e-3,
    mirrorRatio: 4,
  }, { card, condition });
  const started = startup(oscillator);
  assert(started.status === "found");
  const orbit = oscillation(oscillator, { started });
  assert(orbit instanceof Orbit);
  const figures = operatingFigures(oscillator, orbit, { supply: 0.8, offset: 1e6 });
  return { started, figures, oscillator, orbit };
}

Deno.test("tankOfCoil: a drawn coil oscillates as its inductance and quality factor say", () => {
  const coil = drawn();
  const tank = tuned(coil);
  const { coil: _, ...plain } = tank;
  const [real, simple] = [solve(tank), solve(plain)];
  // The plain tank holds L and Q of 5 GHz at all frequencies; both oscillate within 5 % of it.
  assertClose(real.figures.frequency, simple.figures.frequency, { rtol: 0.02, atol: 0 });
  assertClose(real.started.loopGain, simple.started.loopGain, { rtol: 0.1, atol: 0 });
  assertClose(real.figures.amplitude, simple.figures.amplitude, { rtol: 0.1, atol: 0 });
  assertClose(real.figures.phaseNoise, simple.figures.phaseNoise, { rtol: 0, atol: 1.5 });
  // Winding and silicon make the tank's part of the noise: not less than the tank alone.
  assert(real.figures.noiseFactor > 1.2, `${real.figures.noiseFactor}`);
});

Deno.test("tankOfCoil: metal that is hotter than nominal takes loop gain", () => {
  const tank = tuned(drawn());
  const gain = (temperature: number) => {
    const design = {
      tank,
      pair: { width: 30e-6, length: 60e-9 },
      tail: { width: 60e-6, length: 180e-9 },
      current: 2e-3,
      mirrorRatio: 4,
    };
    const found = startup(
      crossCoupledPair.build(design, { card, condition: { ...condition, temperature } }),
    );
    assert(found.status === "found");
    return found.loopGain;
  };
  assert(gain(card.temperature.highest) < gain(card.temperature.nominal));
});

Deno.test("tankOfCoil: a coil read from its own Touchstone file gives the same oscillator", () => {
  const coil = drawn();
  const frequencies = Array.from({ length: 60 }, (_, k) => (k + 1) * 0.25e9);
  // A floating two-port with the differential admittance of the coil between its ports.
  const network = networkFromAdmittance({
    ports: 2,
    frequencies,
    admittance: (frequency) => {
      const { re, im } = coilAdmittance(coil.parameters, frequency, { excitation: "differential" });
      const [own, across] = [{ re, im }, { re: -re, im: -im }];
      return [own, across, across, own];
    },
  });
  const read = readTouchstone(writeTouchstone(network, { digits: 10 }), { name: "coil.s2p" });
  const found = coilFromNetwork(read, {
    excitation: "differential",
    coupling: coil.parameters.coupling ?? NaN,
    to: 12e9,
  });
  assert(found.status === "found");
  const options = { frequency: FREQUENCY, capacitance: 500e-15 };
  const [own, measured] = [
    solve(tankOfCoil(coil, options)),
    solve(tankOfCoil(found.coil, options)),
  ];
  assertClose(measured.figures.frequency, own.figures.frequency, { rtol: 2e-3, atol: 0 });
  assertClose(measured.figures.amplitude, own.figures.amplitude, { rtol: 0.02, atol: 0 });
});

Deno.test("tankOfCoil refuses a coil read from one end, and one above its self-resonance", () => {
  const options = { frequency: FREQUENCY, capacitance: 500e-15 };
  assertThrows(() => tankOfCoil(drawn("single_ended"), options), RangeError, /read differentially/);
  assertThrows(
    () => tankOfCoil(drawn(), { ...options, frequency: 80e9 }),
    RangeError,
    /its self-resonance must lie above/,
  );
});
