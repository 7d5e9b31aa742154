import { assert, assertClose, assertEquals } from "../../assert.ts";
import { deviatedTransistor } from "../../../lib/device/mismatch.ts";
import { Transistor } from "../../../lib/device/transistor.ts";
import { TransistorTable } from "../../../lib/device/transistor_table.ts";
import { parseTransistorTable } from "../../../lib/device/transistor_table_csv.ts";
import { BOLTZMANN } from "../../../lib/quantity/constants.ts";
import { tableCsv, type TableCsvOptions } from "./_table_csv.ts";
import {
  type Bias,
  biases,
  channel,
  coarse,
  FINE,
  fine,
  nDevice,
  nParameters,
  pParameters,
  size,
  tableOf,
  values,
  worst,
} from "./_tables.ts";

Deno.test("TransistorTable has Nyquist noise of its own conductance at zero drain-source voltage", () => {
  // A table of another device than the card's: twice the mobility, threshold 80 mV higher.
  const other = {
    ...nParameters,
    transconductanceParameter: 2 * nParameters.transconductanceParameter,
    threshold: nParameters.threshold + 0.08,
  };
  const foreign = tableOf(new Transistor(other, size), FINE, { parameters: nParameters });
  for (const table of [coarse, fine, foreign]) {
    for (
      const [vg, v, vb] of [[0.4, 0, 0], [0.7, 0.2, -0.1], [1.2, 0.1, 0], [0.95, 0, -0.3]] as const
    ) {
      const out = values(table, [v, vg, v, vb]);
      const density = table.channelNoise(v, vg, v, vb) ** 2;
      const junction = table === foreign ? values(nDevice, [v, vg, v, vb])[19]! : 0;
      assertClose(density, 4 * BOLTZMANN * 300 * (out[4]! - junction / 2), { rtol: 1e-9, atol: 0 });
    }
  }
  // Beyond, the card's shape: for the card's own table, its noise.
  let [error, largest] = [0, 0];
  for (const bias of biases(300)) {
    error = Math.max(error, Math.abs(fine.channelNoise(...bias) - channel.channelNoise(...bias)));
    largest = Math.max(largest, channel.channelNoise(...bias));
  }
  assert(error < 0.012 * largest);
});

Deno.test("TransistorTable has the flicker noise of its own transconductance, with its sign", () => {
  for (const bias of [[0.8, 0.7, 0, 0], [0, 0.7, 0.8, 0], [0.05, 0.9, 0, -0.2]] as Bias[]) {
    assertClose(fine.flickerNoise(...bias), channel.flickerNoise(...bias), {
      rtol: 1e-2,
      atol: 1e-13,
    });
  }
  assert(fine.flickerNoise(0.8, 0.7, 0, 0) > 0 && fine.flickerNoise(0, 0.7, 0.8, 0) < 0);
});

Deno.test("TransistorTable without body voltage takes the body effect from the card, or from gmb", () => {
  const wide: TableCsvOptions = { vgs: [-0.5, 1.4, 39], vds: [0, 1.6, 33] };
  const at = biases(400).filter(([vd, , vs]) => Math.abs(vd - vs) > 0.05);
  for (const conductances of [false, true]) {
    const table = tableOf(channel, { ...wide, conductances });
    // The shift is exact for the charge model: what is left is the grid's, as with a body voltage.
    assert(worst(table, channel, { from: 0, to: 4, at }) < 3e-4);
    assert(
      table.notes.some((note) => /^body voltage: .* shifts the gate by 0\.3 of it/.test(note)),
    );
  }
  // Charges at one body voltage change with it as the card's do.
  const charged = tableOf(channel, { ...wide, charges: true });
  assert(worst(charged, channel, { from: 20, to: 24, at }) < 2e-3);
  assert(charged.notes.some((note) => /^charges: from the table; their change/.test(note)));
});

Deno.test("TransistorTable takes charges and junction currents from the card where it has none", () => {
  const table = tableOf(nDevice, { ...FINE, charges: false });
  for (const bias of biases(30)) {
    assertEquals(
      [...values(table, bias).subarray(20)],
      [...values(nDevice, bias).subarray(20)],
    );
  }
  // A bulk above its source conducts.
  const bias: Bias = [0.8, 0.2, 0, 0.75];
  assertClose(values(table, bias)[3]!, values(nDevice, bias)[3]!, { rtol: 1e-6, atol: 0 });
  assert(table.notes.includes("charges: from the card"));
});

Deno.test("TransistorTable of kind p has negative voltages and currents", () => {
  const pDevice = new Transistor(pParameters, { ...size, bulkJunctions: false });
  const table = tableOf(pDevice, FINE);
  for (const [from, to, bound] of [[0, 4, 1e-4], [4, 20, 2e-3], [20, 24, 6e-5]] as const) {
    assert(worst(table, pDevice, { from, to, at: biases(300, -1) }) < bound);
  }
  const point = table.operatingPoint(0.2, 0.1, 1, 1);
  assert(point.current < 0 && point.gm > 0 && point.gds > 0);
  assertEquals(table.excursion(-1, 0, 1, 1), {
    axis: "vds",
    value: -2,
    lowest: -1.6,
    highest: 0,
  });
});

Deno.test("TransistorTable scales with the width and the number of devices", () => {
  const used = { width: 50e-6, length: 60e-9, multiplier: 2, bulkJunctions: false };
  const table = tableOf(channel, FINE, { used });
  const bias: Bias = [0.7, 0.6, 0.05, 0];
  const [a, b] = [values(table, bias), values(fine, bias)];
  // 50 um x 2 over 20 um.
  assertClose(a, b.map((value) => 5 * value), { rtol: 1e-12, atol: 1e-28 });
  assertClose(table.channelNoise(...bias), Math.sqrt(5) * fine.channelNoise(...bias), {
    rtol: 1e-12,
    atol: 0,
  });
  assertClose(table.flickerNoise(...bias), Math.sqrt(5) * fine.flickerNoise(...bias), {
    rtol: 1e-12,
    atol: 0,
  });
});

Deno.test("TransistorTable deviates as the model does", () => {
  // The gain's deviation is one of the mobility, which velocity saturation would dampen in the model.
  const parameters = { ...nParameters, saturationVelocity: Infinity };
  const ideal = new Transistor(parameters, channel.size);
  const deviation = { threshold: 0.02, gain: -0.05 };
  const [plain, table] = [{}, { deviation }].map((more) =>
    new TransistorTable(parseTransistorTable(tableCsv(ideal, FINE)), {
      parameters,
      size: channel.size,
      characterizedWidth: 20e-6,
      ...more,
    })
  ) as [TransistorTable, TransistorTable];
  const model = new Transistor(deviatedTransistor(parameters, deviation), channel.size);
  const at = biases(300);
  assert(worst(plain, model, { from: 0, to: 4, at }) > 5e-2);
  assert(worst(table, model, { from: 0, to: 4, at }) < 4e-4);
  assertEquals(table.parameters.threshold, nParameters.threshold + 0.02);
});

Deno.test("TransistorTable has the operating point of the model it was made from", () => {
  const table = tableOf(nDevice, { ...FINE, charges: false });
  const bias: Bias = [0.6, 0.62, 0.03, 0];
  const [found, expected] = [table.operatingPoint(...bias), nDevice.operatingPoint(...bias)];
  for (
    const name of ["current", "gm", "gms", "noiseConductance", "gateSourceCapacitance"] as const
  ) {
    assertClose(found[name], expected[name], { rtol: 1e-2, atol: 0, what: name });
  }
  assertClose(found.gds, expected.gds, { rtol: 5e-2, atol: 0 });
  assertEquals(found.region, expected.region);
});
