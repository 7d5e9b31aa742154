import { assert, assertClose, assertEquals, assertThrows } from "../../assert.ts";
import { assemble } from "../../../lib/circuit/circuit.ts";
import type { CircuitElement } from "../../../lib/circuit/element.ts";
import { type CoilElement, type CoilModel, coilModel } from "../../../lib/device/inductor_model.ts";
import type { CoilParameters } from "../../../lib/device/inductor_network.ts";
import { findEquilibrium } from "../../../lib/orbit/equilibrium.ts";

const parameters: CoilParameters = {
  inductance: 1.2e-9,
  seriesResistance: (f) => 0.8 + 1.5e-5 * Math.sqrt(f),
  parallelCapacitance: 8e-15,
  substrate: { oxideCapacitance: 60e-15, siliconResistance: 700, siliconCapacitance: 15e-15 },
  coupling: 0.6,
};

function differential(change: Partial<CoilParameters> = {}): CoilModel {
  return coilModel({ ...parameters, ...change }, {
    origin: "figures",
    excitation: "differential",
  });
}

Deno.test("coilModel finds the self-resonance of a series R and L across C", () => {
  const { substrate: _, ...bare } = parameters;
  const coil = coilModel({ ...bare, seriesResistance: () => 2, parallelCapacitance: 100e-15 }, {
    origin: "figures",
    excitation: "differential",
  });
  const expected = Math.sqrt(1 / (1.2e-9 * 100e-15) - (2 / 1.2e-9) ** 2) / (2 * Math.PI);
  assertClose(coil.selfResonance ?? NaN, expected, { rtol: 1e-12, atol: 0 });
});

Deno.test("coilModel has no self-resonance without capacitance", () => {
  const { substrate: _, ...bare } = parameters;
  const coil = coilModel({ ...bare, parallelCapacitance: 0 }, {
    origin: "figures",
    excitation: "single_ended",
  });
  assertEquals(coil.selfResonance, undefined);
});

Deno.test("coilModel gives the bare inductance and w L / R far below self-resonance", () => {
  const coil = differential();
  const resistance = parameters.seriesResistance(1e7);
  // L - R^2 C, with half the oxide beside the capacitance across; w^2 L C is 2e-7.
  const inductance = 1.2e-9 - resistance ** 2 * 38e-15;
  assertClose(coil.inductance(1e7), inductance, { rtol: 1e-6, atol: 0 });
  assertClose(coil.quality(1e7), 2 * Math.PI * 1e7 * inductance / resistance, {
    rtol: 1e-6,
    atol: 0,
  });
});

Deno.test("coilModel has Q = R_p / (w L_p) as any one-port", () => {
  const coil = differential();
  for (const f of [1e9, 5e9, 12e9]) {
    const { re, im } = coil.admittance(f);
    assertClose(coil.quality(f), -im / re, { rtol: 1e-13, atol: 0 });
    assertClose(coil.parallelResistance(f), 1 / re, { rtol: 1e-15, atol: 0 });
  }
});

Deno.test("coilModel refuses parameters and frequencies out of range", () => {
  const refuse = (change: Partial<CoilParameters>, wording: RegExp) =>
    assertThrows(() => differential(change), RangeError, wording);
  refuse({ inductance: -1e-9 }, /inductance must be > 0 H, got -1e-9 H$/);
  refuse({ parallelCapacitance: NaN }, /parallel capacitance must be >= 0 F, got NaN F$/);
  refuse({ coupling: 1 }, /coupling must lie between -1 and 1, got 1$/);
  const substrate = parameters.substrate!;
  refuse(
    { substrate: { ...substrate, oxideCapacitance: 0 } },
    /oxide capacitance must be > 0 F, got 0 F$/,
  );
  refuse(
    { substrate: { ...substrate, siliconResistance: 0 } },
    /silicon resistance must be > 0 ohm, got 0 ohm$/,
  );
  refuse(
    { substrate: { ...substrate, siliconCapacitance: -1 } },
    /silicon capacitance must be >= 0 F, got -1 F$/,
  );
  assertThrows(() => differential().quality(0), RangeError, /frequency must be > 0 Hz, got 0 Hz$/);
  assertThrows(
    () => differential({ seriesResistance: () => -1 }).elements(1e9),
    RangeError,
    /series resistance must be >= 0 ohm, got -1 ohm at 1000000000 Hz$/,
  );
});

/** The coil's elements in a circuit, tap and silicon as its own nodes. */
function circuitElements(elements: readonly CoilElement[], tap: string): CircuitElement[] {
  const node = (name: string) => name === "tap" ? tap : name;
  return elements.map((element): CircuitElement => {
    switch (element.kind) {
      case "windings":
        return {
          kind: "inductor",
          name: "coil",
          windings: element.windings.map((winding) => ({
            ...winding,
            nodes: [node(winding.nodes[0]), node(winding.nodes[1])],
          })),
          coupling: element.coupling,
          temperature: 300,
        };
      case "capacitor":
        return { ...element, nodes: [node(element.nodes[0]), node(element.nodes[1])] };
      case "resistor":
        return {
          ...element,
          nodes: [node(element.nodes[0]), node(element.nodes[1])],
          temperature: 300,
        };
    }
  });
}

Deno.test("coilModel elements resonate in a circuit where the coil's own admittance says", () => {
  // A pole s of coil and capacitor is a zero of Y_coil(s) + s C, evaluated here by hand in complex s.
  const f = 6e9;
  const capacitance = 500e-15;
  const circuit = assemble([
    ...circuitElements(differential().elements(f), "ground"),
    { kind: "capacitor", name: "C", nodes: ["plus", "minus"], capacitance },
  ]);
  const equilibrium = findEquilibrium(circuit.system);
  assert(equilibrium.status === "found");
  const resistance = parameters.seriesResistance(f);
  const total = (re: number, im: number) => {
    const s = { re, im };
    const series = inverse({ re: resistance + 1.2e-9 * re, im: 1.2e-9 * im });
    const silicon = inverse({ re: 1 / 700 + 15e-15 * re, im: 15e-15 * im });
    const oxide = inverse({ re: 60e-15 * re, im: 60e-15 * im });
    const shunt = inverse({ re: oxide.re + silicon.re, im: oxide.im + silicon.im });
    const across = capacitance + 8e-15;
    return {
      re: series.re + shunt.re / 2 + across * s.re,
      im: series.im + shunt.im / 2 + across * s.im,
    };
  };
  const differentialPoles = equilibrium.poles.filter(({ re, im }) =>
    im > 0 && Math.hypot(total(re, im).re, total(re, im).im) < 1e-9 * capacitance * im
  );
  assertEquals(differentialPoles.length, 1);
  // Against 1/(2 pi sqrt(L C)), with the substrate's share between nothing and half the oxide.
  const frequency = differentialPoles[0]!.im / (2 * Math.PI);
  assert(frequency < 1 / (2 * Math.PI * Math.sqrt(1.2e-9 * 508e-15)));
  assert(frequency > 1 / (2 * Math.PI * Math.sqrt(1.2e-9 * 540e-15)));
});

function inverse({ re, im }: { re: number; im: number }): { re: number; im: number } {
  const size = re * re + im * im;
  return { re: re / size, im: -im / size };
}

Deno.test("coilModel elements of a coil without tap are one winding", () => {
  const { coupling: _, substrate: __, ...bare } = parameters;
  const coil = coilModel({ ...bare, parallelCapacitance: 0 }, {
    origin: "figures",
    excitation: "single_ended",
  });
  assertEquals(coil.elements(1e9), [{
    kind: "windings",
    windings: [{
      nodes: ["plus", "minus"],
      inductance: 1.2e-9,
      seriesResistance: parameters.seriesResistance(1e9),
    }],
    coupling: 0,
  }]);
});
