import {
  geometryFamily,
  type GeometryFamilyOptions,
  measuredFamily,
  ruleFamily,
} from "../../../lib/design/inductor_family.ts";
import { coilFromGeometry } from "../../../lib/device/inductor_from_geometry.ts";
import { coilModel } from "../../../lib/device/inductor_model.ts";
import type { CoilParameters } from "../../../lib/device/inductor_network.ts";
import { spiralInductance } from "../../../lib/device/inductor_spiral_formulas.ts";
import { networkFromAdmittance } from "../../../lib/device/touchstone_network.ts";
import { writeTouchstone } from "../../../lib/device/touchstone_write.ts";
import { assert, assertClose, assertEquals, assertThrows } from "../../assert.ts";
import { FREQUENCY, LAYERS } from "./_inductance_samples.ts";

const GEOMETRY: GeometryFamilyOptions = {
  shape: "octagonal",
  turns: [1, 2, 3],
  widths: [6e-6, 10e-6],
  spacing: 3e-6,
  outerDiameter: { smallest: 60e-6, largest: 300e-6 },
  layers: LAYERS,
  temperature: 300,
  frequency: FREQUENCY,
};

Deno.test("ruleFamily: quality factor as a power of the inductance, self-resonance as its inverse", () => {
  const family = ruleFamily({
    quality: 15,
    exponent: -0.5,
    referenceInductance: 1e-9,
    selfResonance: 30e9,
    smallest: 0.2e-9,
    largest: 8e-9,
  });
  const { quality, selfResonance, capacitance } = family.member(4e-9);
  assertClose(quality, 7.5, { rtol: 1e-12, atol: 0 });
  assertClose(selfResonance, 7.5e9, { rtol: 1e-12, atol: 0 });
  const resonance = 1 / (2 * Math.PI * Math.sqrt(4e-9 * capacitance));
  assertClose(resonance, selfResonance, { rtol: 1e-12, atol: 0 });
});

Deno.test("ruleFamily: a coil whose self-resonance is not known has no capacitance", () => {
  const family = ruleFamily({
    quality: 10,
    referenceInductance: 1e-9,
    smallest: 1e-10,
    largest: 1e-8,
  });
  assertEquals(family.member(3e-9), { quality: 10, selfResonance: Infinity, capacitance: 0 });
});

Deno.test("ruleFamily: refuses figures that are out of range", () => {
  const good = { quality: 10, referenceInductance: 1e-9, smallest: 1e-10, largest: 1e-8 };
  for (
    const [change, message] of [
      [{ quality: NaN }, /quality factor must be > 0/],
      [{ referenceInductance: 0 }, /reference inductance must be > 0 H/],
      [{ largest: 1e-10 }, /must be > 0 H and rise/],
      [{ selfResonance: -1 }, /self-resonance must be > 0 Hz/],
      [{ exponent: NaN }, /exponent must be a finite number/],
    ] as const
  ) {
    assertThrows(() => ruleFamily({ ...good, ...change }), RangeError, message);
  }
});

Deno.test("geometryFamily: a member is the coil of best quality factor among all that could be drawn", () => {
  const family = geometryFamily(GEOMETRY);
  const inductance = 1.6e-9;
  const angular = 2 * Math.PI * FREQUENCY;
  // Every outline on a grid of diameters of 20 nm, kept where the inductance is within 1e-3.
  let best = 0;
  for (const turns of GEOMETRY.turns) {
    for (const width of GEOMETRY.widths) {
      const inner = (outer: number) => outer - 2 * (turns * width + (turns - 1) * 3e-6);
      for (let outerDiameter = 60e-6; outerDiameter <= 300e-6; outerDiameter += 20e-9) {
        if (inner(outerDiameter) < outerDiameter / 3) continue;
        const geometry = {
          shape: "octagonal",
          turns,
          width,
          spacing: 3e-6,
          outerDiameter,
        } as const;
        const own = spiralInductance(geometry).inductance;
        if (Math.abs(own / inductance - 1) > 1e-3) continue;
        const coil = coilFromGeometry(geometry, LAYERS, {
          excitation: "differential",
          temperature: 300,
          coupling: 0.5,
        });
        best = Math.max(best, coil.parallelResistance(FREQUENCY) / (angular * own));
      }
    }
  }
  const member = family.member(inductance);
  assertClose(member.quality, best, { rtol: 2e-3, atol: 0 });
  assert(/^\d turns?, \d+ um wide, \d+ um across$/.test(member.description!), member.description);
});

Deno.test("geometryFamily: a member resonates with its own capacitance near its self-resonance", () => {
  // The capacitance at the frequency is not quite that at self-resonance, where the silicon shunts the oxide.
  const { capacitance, selfResonance } = geometryFamily(GEOMETRY).member(2e-9);
  const resonance = 1 / (2 * Math.PI * Math.sqrt(2e-9 * capacitance));
  assertClose(resonance, selfResonance, { rtol: 0.2, atol: 0 });
});

Deno.test("geometryFamily: refuses ranges without a coil, with a gap, and inductances outside", () => {
  assertThrows(
    () => geometryFamily({ ...GEOMETRY, widths: [110e-6] }),
    RangeError,
    /at least one coil must fit/,
  );
  assertThrows(
    () =>
      geometryFamily({
        ...GEOMETRY,
        turns: [1, 6],
        outerDiameter: { smallest: 100e-6, largest: 110e-6 },
        widths: [3e-6],
        spacing: 2e-6,
      }),
    RangeError,
    /the outlines must overlap/,
  );
  assertThrows(
    () => geometryFamily({ ...GEOMETRY, openingShare: 1 }),
    RangeError,
    /opening share must lie between 0 and 1/,
  );
  assertThrows(
    () => geometryFamily(GEOMETRY).member(50e-9),
    RangeError,
    /inductance must lie from/,
  );
});

/** A two-port file of a known coil, its ends at the ports. */
function file(parameters: CoilParameters): string {
  const coil = coilModel(parameters, { origin: "figures", excitation: "single_ended" });
  const frequencies = Array.from({ length: 60 }, (_, k) => 0.2e9 * (k + 1));
  return writeTouchstone(networkFromAdmittance({
    ports: 1,
    frequencies,
    admittance: (frequency) => [coil.admittance(frequency)],
  }));
}

const KNOWN: CoilParameters = {
  inductance: 1.2e-9,
  seriesResistance: () => 2.4,
  parallelCapacitance: 20e-15,
};

Deno.test("measuredFamily: recovers known coils from their files, by rising inductance", () => {
  const family = measuredFamily([
    { name: "large.s1p", text: file({ ...KNOWN, inductance: 2.2e-9 }) },
    { name: "small.s1p", text: file(KNOWN) },
  ], { frequency: FREQUENCY, excitation: "single_ended" });
  assertEquals(family.inductances!.length, 2);
  assertClose(family.smallest, 1.2e-9, { rtol: 1e-3, atol: 0 });
  assertClose(family.largest, 2.2e-9, { rtol: 1e-3, atol: 0 });
  const { quality, capacitance, description } = family.member(family.smallest);
  const angular = 2 * Math.PI * FREQUENCY;
  const reactance = angular * 1.2e-9;
  // R || of the series branch: (r^2 + X^2) / r over X.
  assertClose(quality, (2.4 ** 2 + reactance ** 2) / 2.4 / reactance, { rtol: 1e-3, atol: 0 });
  // The series branch takes 1 / (1 + r^2/X^2) of the inductor's susceptance away.
  const lifted = 20e-15 + (1 - 1 / (1 + (2.4 / reactance) ** 2)) / (angular ** 2 * 1.2e-9);
  assertClose(capacitance, lifted, { rtol: 0, atol: 0.5e-15 });
  assertEquals(description, "small.s1p");
  assertThrows(() => family.member(1.5e-9), RangeError, /inductance must be one of the set's/);
});

Deno.test("measuredFamily: of two coils of one inductance the better is kept", () => {
  const text = file(KNOWN);
  const family = measuredFamily(
    [{ name: "once.s1p", text }, { name: "again.s1p", text }],
    { frequency: FREQUENCY, excitation: "single_ended" },
  );
  assertEquals(family.inductances!.length, 1);
  assertEquals(family.smallest, family.largest);
});

Deno.test("measuredFamily: names the file that cannot be used, and the line", () => {
  const options = { frequency: FREQUENCY, excitation: "single_ended" } as const;
  assertThrows(
    () => measuredFamily([{ name: "bad.s1p", text: "# GHz S RI R 50\n1 0.1 nonsense\n" }], options),
    SyntaxError,
    /^bad\.s1p: .*line 2/s,
  );
  assertThrows(() => measuredFamily([], options), RangeError, /at least one file/);
  const beyond = { frequency: 50e9, excitation: "single_ended" } as const;
  assertThrows(
    () => measuredFamily([{ name: "low.s1p", text: file(KNOWN) }], beyond),
    RangeError,
    /^low\.s1p: /,
  );
});
