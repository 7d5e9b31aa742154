import { assert, assertClose, assertEquals, assertThrows } from "../../assert.ts";
import {
  parseTransistorTable,
  TransistorTableError,
} from "../../../lib/device/transistor_table_csv.ts";

/** id = 1 mA/V^3 vgs^2 vds + 0.1 vbs on a grid, as rows of text. */
function rows(
  { gates = [0, 0.4, 0.8, 1.2], drains = [0, 0.3, 0.6, 1], bulks = [0] } = {},
): string[] {
  return bulks.flatMap((b) =>
    gates.flatMap((g) => drains.map((d) => `${g},${d},${b},${1e3 * g * g * d * (1 + 0.1 * b)}`))
  );
}

const HEAD = "vgs [V],vds [V],vbs [V],id [uA]";

function table(lines: readonly string[], head = HEAD): string {
  return [head, ...lines].join("\n");
}

Deno.test("parseTransistorTable puts rows of any order on their grid in SI", () => {
  const lines = rows({ bulks: [-0.5, 0] });
  const data = parseTransistorTable(table(lines.toReversed()));
  assertEquals([...data.gateVoltages], [0, 0.4, 0.8, 1.2]);
  assertEquals([...data.drainVoltages], [0, 0.3, 0.6, 1]);
  assertEquals([...data.bulkVoltages], [-0.5, 0]);
  // vgs 0.8, vds 0.6, vbs -0.5 at (2, 2, 0) of (4, 4, 2).
  assertClose(data.current[(2 * 4 + 2) * 2]!, 1e-3 * 0.64 * 0.6 * 0.95, { rtol: 1e-13, atol: 0 });
  assert(data.gm === undefined && data.charges === undefined);
});

Deno.test("parseTransistorTable takes comments, blanks, quotes, other separators and line ends", () => {
  const plain = parseTransistorTable(table(rows()));
  const dressed = "\uFEFF# measured\r\n\r\n" +
    table(rows().map((line) => `  ${line}  `), '"vgs (mV)", Vds [V] ,vbs,id [uA]')
      .replaceAll(/^ {2}([\d.]+)/gm, (_, v) => String(1000 * Number(v))).replaceAll("\n", "\r\n");
  assertClose(parseTransistorTable(dressed).gateVoltages, plain.gateVoltages, {
    rtol: 1e-13,
    atol: 1e-15,
  });
  for (const separator of [";", "\t"]) {
    assertEquals(parseTransistorTable(table(rows()).replaceAll(",", separator)), plain);
  }
});

Deno.test("parseTransistorTable without body voltage stands at zero, and merges rounding", () => {
  const lines = rows().map((line) => {
    const [g, d, , i] = line.split(",");
    return [g === "0.8" ? "0.8000000000000002" : g, d, i].join(",");
  });
  lines[9] = lines[9]!.replace("0.8000000000000002", "0.8");
  const data = parseTransistorTable(table(lines, "vgs,vds,id"));
  assertEquals([...data.bulkVoltages], [0]);
  assertEquals(data.gateVoltages.length, 4);
  // Without a unit a column is in SI: amperes.
  assertClose(data.current.at(-1)!, 1e3 * 1.44, { rtol: 1e-13, atol: 0 });
});

Deno.test("parseTransistorTable reads conductances and charges and checks that charges balance", () => {
  const lines = rows().map((line) => `${line},1,2,3,-1,5,-2,-2`);
  const head = `${HEAD},gm [mS],gds [uS],gmb,qd [fC],qg [fC],qs [fC],qb [fC]`;
  const data = parseTransistorTable(table(lines, head));
  assertClose([data.gm![3]!, data.gds![3]!, data.gmb![3]!], [1e-3, 2e-6, 3], {
    rtol: 1e-14,
    atol: 0,
  });
  const { drain, gate, source } = data.charges!;
  assertClose([drain[0]!, gate[0]!, source[0]!], [-1e-15, 5e-15, -2e-15], { rtol: 1e-14, atol: 0 });
  lines[4] = lines[4]!.replace(/-2$/, "-1");
  assertThrows(
    () => parseTransistorTable(table(lines, head)),
    RangeError,
    /line 6: charges qd, qg, qs and qb must sum to 0 C, got 1e-15 C|line 6: .* got 1\.0*\d*e-15 C/,
  );
});

/** Reads a text that cannot be read, and its message without the place. */
function fault(text: string): { line: number; column: number; message: string } {
  try {
    parseTransistorTable(text);
  } catch (error) {
    assert(error instanceof TransistorTableError, String(error));
    const { line, column, message } = error;
    assert(
      message.startsWith(`Cannot read the transistor table: line ${line}, column ${column}: `),
    );
    return { line, column, message };
  }
  throw new Error("the text was read");
}

Deno.test("parseTransistorTable names line and column of a wrong field", () => {
  const lines = rows();
  lines[2] = "0,0.6,0,abc";
  const wrong = fault(`# first\n${table(lines)}`);
  assertEquals([wrong.line, wrong.column], [5, 9]);
  assert(wrong.message.endsWith('expected a number for id, got "abc"'));
  const short = fault(table(["0,0,0,0", "0,0.3, 0"]));
  assertEquals([short.line, short.column], [3, 8]);
  assert(/expected 4 fields as in the first line, got 3$/.test(short.message));
  const comma = fault(table(["0;0;0;0,5"], HEAD.replaceAll(",", ";")));
  assert(/got "0,5" \(write the decimal mark as a point\)$/.test(comma.message));
  assert(
    /expected a number for vds, got "Infinity"$/.test(fault(table(["0,Infinity,0,0"])).message),
  );
});

Deno.test("parseTransistorTable names what is wrong with the first line", () => {
  const head = (text: string) => fault(table(rows(), text));
  const unknown = head("vgs,vds,vbs,ids");
  assertEquals([unknown.line, unknown.column], [1, 13]);
  assert(/expected one of vgs \[V\], .*, qb \[C\], got "ids"$/.test(unknown.message));
  assert(/expected each column once, got vds again$/.test(head("vgs,vds,vds,id").message));
  assert(/expected columns vgs, vds, id, missing id$/.test(head("vgs,vds,vbs,gm").message));
  assert(
    /expected a unit such as A in brackets, got "V"$/.test(head("vgs,vds,vbs,id [V]").message),
  );
  assert(
    /expected all of qd, qg, qs or no charges, missing qs$/.test(
      fault(table([], "vgs,vds,id,qd,qg")).message,
    ),
  );
  assert(/got an empty file$/.test(fault("# nothing\n").message));
  assert(/expected rows of numbers after it, got none$/.test(fault(HEAD).message));
});

Deno.test("parseTransistorTable names the points that are missing or stand twice", () => {
  const lines = rows({ bulks: [-0.5, 0] });
  const holes = lines.filter((_, k) => ![3, 9, 17, 20].includes(k));
  assertThrows(
    () => parseTransistorTable(table(holes)),
    RangeError,
    /every point of the grid of 4 x 4 x 2 must have a row, missing are \(vgs 0 V, vds 0\.3 V, vbs 0 V\), .* and 1 more$/,
  );
  assertThrows(
    () => parseTransistorTable(table([...lines, lines[5]!])),
    RangeError,
    /every point must stand once, got vgs 0\.4 V, vds 0\.3 V, vbs -0\.5 V in line 7 and in line 34$/,
  );
  const flat = rows();
  assertThrows(
    () => parseTransistorTable(table(flat.slice(1))),
    RangeError,
    /grid of 4 x 4 must have a row, missing are \(vgs 0 V, vds 0 V\)$/,
  );
});

Deno.test("parseTransistorTable refuses a grid that is too small or slips", () => {
  assertThrows(
    () => parseTransistorTable(table(rows({ gates: [0, 0.5, 1] }))),
    RangeError,
    /vgs must take at least 4 values, got 0 V, 0\.5 V, 1 V$/,
  );
  const slipped = rows();
  slipped[6] = slipped[6]!.replace("0.4", "0.4001");
  assertThrows(
    () => parseTransistorTable(table(slipped)),
    RangeError,
    /values of vgs must form a grid, got 0\.4 V in line 6 and 0\.4001 V in line 8$/,
  );
});
