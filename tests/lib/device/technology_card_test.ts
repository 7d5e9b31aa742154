import { Ajv } from "ajv";
import { assert, assertClose, assertEquals, assertThrows } from "../../assert.ts";
import { CARD_FIELDS } from "../../../lib/device/_card_fields.ts";
import { fileName, isGroup, type Shape } from "../../../lib/device/_card_shape.ts";
import { technologyCardFrom } from "../../../lib/device/technology_card.ts";
import { parseQuantity } from "../../../lib/quantity/parse_quantity.ts";
import { cardSchema, illustrativeCard, illustrativeData } from "./_card.ts";

/** The data with the entry at `path` replaced, or taken away when `value` is undefined. */
function changed(path: readonly (string | number)[], value: unknown): unknown {
  const data = structuredClone(illustrativeData());
  // deno-lint-ignore no-explicit-any -- walks untyped data on purpose
  let at: any = data;
  for (const step of path.slice(0, -1)) at = at[step];
  const last = path.at(-1)!;
  if (value === undefined) delete at[last];
  else at[last] = value;
  return data;
}

function read(path: readonly (string | number)[], value: unknown): () => unknown {
  return () => technologyCardFrom(changed(path, value), parseQuantity);
}

Deno.test("technologyCardFrom reads the shipped card in SI", () => {
  const card = illustrativeCard();
  assert(card.illustrative);
  assertEquals(card.supply, { nominal: 1, lowest: 0.7, highest: 1.2 });
  assertClose(card.temperature.lowest, 233.15, { rtol: 1e-14, atol: 0 });
  const n = card.transistors.find((t) => t.kind === "n" && t.flavour === "regular")!;
  assertClose(
    [n.minimumLength, n.oxideCapacitance, n.overlapCapacitance, n.thresholdMismatch],
    [60e-9, 16e-3, 0.28e-9, 3e-9],
    { rtol: 1e-14, atol: 0 },
  );
  assertClose(card.limits.metalCurrentDensity.value, 3e3, { rtol: 1e-14, atol: 0 });
  for (const { origin } of Object.values(card.limits)) {
    assertEquals(origin, "illustrative; replace by the foundry's rule");
  }
});

Deno.test("technologyCardFrom hands every quantity to the parser with its unit and its path", () => {
  const seen = new Map<string, string>();
  technologyCardFrom(illustrativeData(), (text, unit, path) => {
    seen.set(path, unit);
    return parseQuantity(text, unit);
  });
  assertEquals(seen.get("transistors[0].junction.area_capacitance"), "F/m^2");
  assertEquals(seen.get("limits.gate_drain_voltage.value"), "V");
  assertEquals(seen.get("passives.corners.slow.capacitor_factor"), "1");
});

Deno.test("technologyCardFrom names the place of a missing, an unknown and a wrong field", () => {
  assertThrows(
    read(["transistors", 1, "threshold"], undefined),
    TypeError,
    /Cannot read the technology card: transistors\[1\]\.threshold: expected a value, got no such field/,
  );
  assertThrows(
    read(["supply", "nominl"], "1 V"),
    TypeError,
    /supply\.nominl: expected one of nominal, lowest, highest, got "nominl"/,
  );
  assertThrows(
    read(["supply", "nominal"], 1),
    TypeError,
    /supply\.nominal: expected a text with a unit \(V\), got 1/,
  );
  assertThrows(
    read(["limits"], null),
    TypeError,
    /limits: expected a set of named fields, got nothing/,
  );
  assertThrows(read(["illustrative"], "yes"), TypeError, /illustrative: expected true or false/);
  assertThrows(
    read(["electrostatic_discharge", "human_body_class"], "9"),
    TypeError,
    /human_body_class: expected one of 0Z, .*, got "9"/,
  );
  assertThrows(read(["transistors"], []), TypeError, /transistors: expected a list/);
  assertThrows(
    () => technologyCardFrom("text", parseQuantity),
    TypeError,
    /the card: expected a set of named fields/,
  );
  // What the parser throws passes through.
  assertThrows(read(["supply", "nominal"], "1 A"), TypeError, /voltage.*1 A/);
});

Deno.test("technologyCardFrom refuses values that make no transistor or no range", () => {
  assertThrows(
    read(["transistors", 0, "slope_factor"], "0.9"),
    RangeError,
    /slope_factor: expected a number >= 1, got 0.9/,
  );
  assertThrows(
    read(["transistors", 0, "oxide_capacitance"], "0 F/m^2"),
    RangeError,
    /oxide_capacitance: expected a value > 0 F\/m\^2, got "0 F\/m\^2"/,
  );
  assertThrows(
    read(["transistors", 0, "flicker_coefficient"], "-1 V^2*F"),
    RangeError,
    /flicker_coefficient: expected a value >= 0/,
  );
  assertThrows(
    read(["transistors", 0, "junction", "grading"], "1"),
    RangeError,
    /grading: expected a number < 1/,
  );
  assertThrows(
    read(["supply", "lowest"], "1.1 V"),
    RangeError,
    /supply: expected lowest <= nominal/,
  );
  assertThrows(
    read(["transistors", 1, "flavour"], "regular"),
    RangeError,
    /transistors\[1\]: expected each kind and flavour once, got n regular again/,
  );
});

Deno.test("technologyCardFrom and the schema file know the same fields, units and words", () => {
  type Node = Record<string, unknown>;
  let quantities = 0;
  const isOptional = (shape: Shape) => !isGroup(shape) && shape.field === "optional";
  const compare = (shape: Shape, node: Node, path: string): void => {
    if (isGroup(shape)) {
      const names = Object.keys(shape).map(fileName);
      const needed = Object.entries(shape).filter(([, inner]) => !isOptional(inner))
        .map(([name]) => fileName(name));
      assertEquals(node.additionalProperties, false, path);
      assertEquals(node.type, "object", path);
      assertEquals([...node.required as string[]].sort(), [...needed].sort(), path);
      assertEquals(Object.keys(node.properties as Node).sort(), [...names].sort(), path);
      for (const [name, inner] of Object.entries(shape)) {
        const next = (node.properties as Record<string, Node>)[fileName(name)]!;
        compare(inner, next, `${path}.${name}`);
      }
      return;
    }
    switch (shape.field) {
      case "quantity":
        quantities++;
        assertEquals(node.type, "string", path);
        assert(
          String(node.description).endsWith(`[${shape.unit}]`),
          `${path}: ${node.description}`,
        );
        return;
      case "word":
        return assertEquals(node.enum, [...shape.words], path);
      case "optional":
        return compare(shape.of, node, path);
      case "list":
        assertEquals(node.type, "array", path);
        return compare(shape.of, node.items as Node, `${path}[]`);
      default:
        assertEquals(node.type, shape.field === "flag" ? "boolean" : "string", path);
    }
  };
  compare(CARD_FIELDS, cardSchema(), "card");
  assert(quantities > 40);
});

Deno.test("technologyCardFrom and the schema accept the shipped card and refuse an unknown field", () => {
  const validate = new Ajv({ strict: true }).compile(cardSchema());
  assert(validate(illustrativeData()), JSON.stringify(validate.errors));
  assert(!validate(changed(["transistors", 0, "surprise"], "1")));
  assert(!validate(changed(["passives", "corners", "fast"], undefined)));
});

Deno.test("technologyCardFrom reads a card without varactors and bank, and one with half of them", () => {
  const without = technologyCardFrom(changed(["varactors"], undefined), parseQuantity);
  assert(without.varactors === undefined && without.capacitorBank !== undefined);
  const half = technologyCardFrom(changed(["varactors", "junction"], undefined), parseQuantity);
  assert(half.varactors?.junction === undefined && half.varactors?.accumulation !== undefined);
  const validate = new Ajv({ strict: true }).compile(cardSchema());
  assert(validate(changed(["varactors"], undefined)));
  assert(validate(changed(["varactors", "junction"], undefined)));
  assert(!validate(changed(["varactors", "corners"], undefined)));
});

Deno.test("technologyCardFrom refuses values that make no varactor or no bank", () => {
  assertThrows(
    read(["varactors", "junction", "grading"], "1.2"),
    RangeError,
    /varactors\.junction\.grading: expected a number < 1, got 1.2/,
  );
  assertThrows(
    read(["varactors", "accumulation", "minimum_capacitance"], "13 fF/um^2"),
    RangeError,
    /varactors\.accumulation: expected minimum_capacitance <= maximum_capacitance/,
  );
  assertThrows(
    read(["capacitor_bank", "plate_fraction"], "1"),
    RangeError,
    /capacitor_bank\.plate_fraction: expected a number < 1/,
  );
  assertThrows(
    read(["varactors", "junction", "emission"], undefined),
    TypeError,
    /varactors\.junction\.emission: expected a value, got no such field/,
  );
});
