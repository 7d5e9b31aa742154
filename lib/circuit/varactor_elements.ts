import type { Varactor } from "../device/varactor.ts";
import type { CircuitElement } from "./element.ts";

/** Least series resistance worth an own node [ohm]. */
const NEGLIGIBLE = 1e-6;

/** How a varactor is joined. */
export interface VaractorPlace {
  /** Nodes of the varactor's terminals in their order. */
  readonly nodes: readonly string[];
  /** Potentials at which the loss is taken, in the order of the terminals [V]. */
  readonly bias: Float64Array;
  /** Temperature of the loss [K]. */
  readonly temperature: number;
}

/**
 * A varactor as elements of a circuit: its charge-based device behind a series resistance that makes
 * its loss at the bias, with the loss's noise.
 *
 * @throws RangeError where the number of nodes or potentials is not that of the terminals
 */
export function varactorElements(
  name: string,
  varactor: Varactor,
  { nodes, bias, temperature }: VaractorPlace,
): CircuitElement[] {
  const count = varactor.terminals.length;
  if (nodes.length !== count || bias.length !== count) {
    throw new RangeError(
      `Cannot join the varactor ${name}: ${count} nodes and potentials are needed, got ${nodes.length} and ${bias.length}`,
    );
  }
  const [first = "", ...others] = nodes;
  const resistance = varactor.lossResistance(bias);
  const lossless = !(resistance > NEGLIGIBLE);
  const inner = lossless ? first : `${name} plate`;
  const device: CircuitElement = {
    kind: "device",
    name,
    nodes: [inner, ...others],
    evaluate: (v, out) => varactor.evaluate(v, out),
    noise: varactor.noise,
  };
  if (lossless) return [device];
  const loss: CircuitElement = {
    kind: "resistor",
    name: `${name} loss`,
    nodes: [first, inner],
    resistance,
    temperature,
  };
  return [loss, device];
}
