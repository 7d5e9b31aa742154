import { assert, assertClose, assertEquals, assertThrows } from "../../assert.ts";
import { TransistorTable } from "../../../lib/device/transistor_table.ts";
import { parseTransistorTable } from "../../../lib/device/transistor_table_csv.ts";
import { derivative } from "./_biases.ts";
import { tableCsv } from "./_table_csv.ts";
import {
  type Bias,
  biases,
  channel,
  COARSE,
  coarse,
  FINE,
  fine,
  nDevice,
  nParameters,
  size,
  tableOf,
  values,
  worst,
} from "./_tables.ts";

Deno.test("TransistorTable of the model errs by its grid, and by the fourth power of its spacing", () => {
  const at = biases(1500);
  for (
    const [from, to, onCoarse, onFine, order] of [
      // Currents, conductances, charges, capacitances, each over its largest: bounds twice what the spacing
      // of 100 and 50 mV leaves. Half the spacing: 16 for values and 8 for slopes in the limit.
      [0, 4, 1.1e-3, 6e-5, 12],
      [4, 20, 1.2e-2, 1.3e-3, 6],
      [20, 24, 7e-4, 5e-5, 12],
      [24, 40, 2.6e-2, 3e-3, 6],
    ] as const
  ) {
    const errors = [coarse, fine].map((table) => worst(table, channel, { from, to, at }));
    assert(errors[0]! < onCoarse && errors[1]! < onFine, `${from}: ${errors}`);
    assert(errors[0]! / errors[1]! > order, `${from}: ${errors}`);
  }
});

Deno.test("TransistorTable passes through every point of its grid", () => {
  for (const [vgs, vds, vbs] of [[0.5, 0.7, -0.4], [1.4, 1.6, 0.4], [-0.3, 0.2, -0.8]] as const) {
    const bias: Bias = [vds, vgs, 0, vbs];
    const [a, b] = [coarse, channel].map((each) => values(each, bias)) as [
      Float64Array,
      Float64Array,
    ];
    assertClose(a[0]!, b[0]!, { rtol: 1e-11, atol: 1e-15 });
    assertClose(a.subarray(20, 24), b.subarray(20, 24), { rtol: 1e-11, atol: 1e-26 });
  }
});

Deno.test("TransistorTable gives the derivatives of its own currents and charges", () => {
  const open = tableOf(nDevice, { vgs: [-0.3, 1.4, 18], vds: [0, 1.6, 17] });
  const odd = tableOf(nDevice, { vgs: [-0.3, 1.4, 18], vds: [0, 1.6, 17], charges: true });
  for (const table of [coarse, open, odd]) {
    // Inside, around zero drain-source voltage, and outside the grid on every side.
    const more: Bias[] = [
      [0.003, 0.7, 0, 0],
      [-0.04, 0.7, 0, -0.1],
      [2, 0.8, 0, 0],
      [0.5, 1.9, 0, -0.2],
      [0.5, -0.8, 0, 0.1],
      [0.4, 0.6, 0, -1.4],
      [-0.3, 0.5, 1.6, -0.2],
    ];
    for (const bias of [...biases(40), ...more]) {
      const exact = values(table, bias);
      for (const [start, from] of [[4, 0], [24, 20]] as const) {
        const largest = Math.max(...exact.subarray(start, start + 16).map(Math.abs));
        for (let column = 0; column < 4; column++) {
          for (let row = 0; row < 4; row++) {
            const expected = derivative(
              (by) => {
                const moved: Bias = [...bias];
                moved[column]! += by;
                return values(table, moved)[from + row]!;
              },
              0,
              1e-4,
            );
            // A knot inside the step leaves the jump of the third derivative times its square: 1e-6.
            assertClose(exact[start + 4 * row + column]!, expected, {
              rtol: 1e-5,
              atol: 1e-5 * largest,
              what: `${bias} row ${row} column ${column}`,
            });
          }
        }
      }
    }
  }
});

Deno.test("TransistorTable is twice continuously differentiable over knots, edges and zero voltage", () => {
  const step = 1e-4;
  const crossings: [string, (s: number) => Bias][] = [
    ["a knot of vgs", (s) => [0.63, 0.7 + s, 0, -0.1]],
    ["a knot of vds", (s) => [0.6 + s, 0.63, 0, -0.1]],
    ["a knot of vbs", (s) => [0.63, 0.77, 0, -0.2 + s]],
    ["the upper edge of vgs", (s) => [0.63, 1.4 + s, 0, -0.1]],
    ["the upper edge of vds", (s) => [1.6 + s, 0.63, 0, -0.1]],
    ["the lower edge of vbs", (s) => [0.63, 0.77, 0, -0.8 + s]],
    ["zero drain-source voltage", (s) => [s, 0.63, 0, -0.1]],
    ["the upper end of the blend", (s) => [0.1 + s, 0.63, 0, -0.1]],
    ["the lower end of the blend", (s) => [-0.1 + s, 0.63, 0, -0.1]],
  ];
  for (const [name, bias] of crossings) {
    // Curvature on both sides from the Jacobian, along the path, and twice as far away.
    const slope = (s: number) => {
      const by = bias(s + 1).map((v, k) => v - bias(s)[k]!);
      const out = values(coarse, bias(s));
      return by.reduce((sum, part, k) => sum + part * out[4 + k]!, 0);
    };
    const curvature = (from: number, to: number) => (slope(to) - slope(from)) / (to - from);
    const left = curvature(-2 * step, 0);
    const right = curvature(0, 2 * step);
    const before = curvature(-4 * step, -2 * step);
    const after = curvature(2 * step, 4 * step);
    // Without a jump the change across is that of the third derivative, as on either side.
    const drift = Math.abs(left - before) + Math.abs(after - right);
    assert(Math.abs(right - left) < 2 * drift + 1e-6, `${name}: ${[before, left, right, after]}`);
  }
});

Deno.test("TransistorTable from zero drain-source voltage up is symmetric in drain and source", () => {
  for (
    const [vd, vg, vs, vb] of [...biases(60), [0.31, 0.8, 0.3, 0], [0.3, 0.8, 0.35, 0]] as Bias[]
  ) {
    const [a, b] = [values(fine, [vd, vg, vs, vb]), values(fine, [vs, vg, vd, vb])];
    assertClose(b[2]!, a[0]!, { rtol: 1e-12, atol: 1e-18 });
    assertClose([b[22]!, b[21]!, b[20]!], [a[20]!, a[21]!, a[22]!], { rtol: 1e-12, atol: 1e-28 });
    assertClose(
      fine.channelNoise(vs, vg, vd, vb),
      fine.channelNoise(vd, vg, vs, vb),
      { rtol: 1e-12, atol: 0 },
    );
    assertClose(fine.flickerNoise(vs, vg, vd, vb), -fine.flickerNoise(vd, vg, vs, vb), {
      rtol: 1e-9,
      atol: 1e-24,
    });
  }
  const still = values(fine, [0.2, 0.9, 0.2, 0]);
  assert(still[0] === 0 && still[4]! > 0);
});

Deno.test("TransistorTable conserves charge, and only differences of potential count", () => {
  const table = tableOf(nDevice, { ...FINE, charges: false });
  for (const bias of biases(60)) {
    const out = values(table, bias);
    for (const from of [0, 20]) {
      const part = out.subarray(from, from + 20);
      const most = (entries: Float64Array) => Math.max(...entries.map(Math.abs));
      const total = part.subarray(0, 4).reduce((sum, value) => sum + value, 0);
      assertClose(total, 0, { rtol: 0, atol: 1e-14 * most(part.subarray(0, 4)) });
      const atol = 1e-13 * most(part.subarray(4));
      for (let k = 0; k < 4; k++) {
        const row = [0, 1, 2, 3].reduce((sum, j) => sum + part[4 + 4 * k + j]!, 0);
        const column = [0, 1, 2, 3].reduce((sum, j) => sum + part[4 + 4 * j + k]!, 0);
        assertClose([row, column], [0, 0], { rtol: 0, atol });
      }
    }
  }
});

Deno.test("TransistorTable says where a bias leaves its range and refuses it on demand", () => {
  assert(coarse.withinRange(1.6, 1.4, 0, 0.4) && coarse.withinRange(0, 0.7, 1.2, -0.1));
  assertEquals(coarse.excursion(1.75, 0.7, 0, 0), {
    axis: "vds",
    value: 1.75,
    lowest: 0,
    highest: 1.6,
  });
  // The one that is furthest outside.
  assertEquals(coarse.excursion(1.7, 1.9, 0, 0)?.axis, "vgs");
  assertEquals(coarse.excursion(0.7, 0.7, 0, -1)?.axis, "vbs");
  coarse.demandWithinRange(0.7, 0.7, 0, 0);
  assertThrows(
    () => coarse.demandWithinRange(0.2, 0.7, 2, 0.1),
    RangeError,
    /^Cannot use the transistor table at drain 0\.2 V, gate 0\.7 V, source 2 V, bulk 0\.1 V: vds must lie between 0 V and 1\.6 V, got 1\.8 V$/,
  );
  // Outside nothing throws and nothing jumps: far out the current is a line.
  const far = [5, 6, 7].map((vd) => values(coarse, [vd, 0.7, 0, 0])[0]!);
  assert(far.every(Number.isFinite));
  assertClose(far[2]! - far[1]!, far[1]! - far[0]!, { rtol: 1e-6, atol: 0 });
  // Without a body voltage in the table any is covered, as far as the shifted gate goes.
  const flat = tableOf(channel, { vgs: [-0.3, 1.4, 18], vds: [0, 1.6, 17] });
  assert(flat.withinRange(0.5, 0.5, 0, -2) && !flat.withinRange(0.5, 0.1, 0, -2));
});

Deno.test("TransistorTable with negative drain-source voltages is used as it is", () => {
  const both = tableOf(channel, {
    vgs: [-0.3, 2.2, 51],
    vds: [-0.8, 0.8, 33],
    vbs: [-1.2, 0.4, 9],
  });
  const at = biases(300).filter((bias) => both.withinRange(...bias));
  assert(at.length > 100);
  assert(worst(both, channel, { from: 0, to: 4, at }) < 3e-4);
  assert(both.notes.includes("drain and source: negative vds from the table"));
});

Deno.test("TransistorTable refuses tables that contradict themselves", () => {
  const data = parseTransistorTable(tableCsv(channel, COARSE));
  const options = { parameters: nParameters, size, characterizedWidth: 20e-6 };
  const refused = (
    change: Partial<typeof data>,
    wording: RegExp,
    kind: ErrorConstructor | typeof RangeError = RangeError,
  ) => assertThrows(() => new TransistorTable({ ...data, ...change }, options), kind, wording);
  refused(
    { gm: data.gm!.map((g) => -g) },
    /gm must be the slope of the current, got a difference of/,
  );
  refused({ gds: data.gds!.map((g) => 1e3 * g) }, /gds must be the slope of the current/);
  refused(
    { drainVoltages: data.drainVoltages.map((v) => v + 0.05) },
    /vds must take the value 0 V, got 0\.05 V to 1\.65\d* V/,
  );
  refused(
    { current: data.current.map((i) => i + 1e-5) },
    /the current at vds 0 V must be 0 A, got .* A at vgs -0\.3 V/,
  );
  refused(
    { current: data.current.map((i, k) => k === 5 ? NaN : i) },
    /values of current must be finite, got NaN/,
  );
  refused({ current: data.current.map(() => 0) }, /a current must differ from 0 A/);
  assertThrows(
    () => new TransistorTable({ ...data, current: data.current.slice(1) }, options),
    TypeError,
    /expected 2142 values of current, got 2141/,
  );
  assertThrows(
    () => new TransistorTable(data, { ...options, characterizedWidth: 0 }),
    RangeError,
    /characterized width must be > 0 m, got 0 m/,
  );
});
