import type { CoilElement, CoilModel, CoilNode } from "../device/inductor_model.ts";
import { type CircuitElement, GROUND } from "./element.ts";

/** How a coil is joined. */
export interface CoilPlace {
  /** Nodes of the ends, and of the centre tap where the coil has one. */
  readonly plus: string;
  readonly minus: string;
  readonly tap?: string;
  /** Frequency at which its series resistance is taken [Hz]. */
  readonly frequency: number;
  /** Temperature of its losses [K]. */
  readonly temperature: number;
}

/**
 * A coil as elements of a circuit: coupled windings with their series resistance, capacitances and the
 * substrate's resistances, with the noise of all losses.
 *
 * @throws RangeError for a coil with a tap that is given no node for it
 */
export function coilElements(
  name: string,
  coil: CoilModel,
  { plus, minus, tap, frequency, temperature }: CoilPlace,
): CircuitElement[] {
  const nodeOf = (node: CoilNode): string => {
    switch (node) {
      case "plus":
        return plus;
      case "minus":
        return minus;
      case "ground":
        return GROUND;
      case "tap":
        if (tap === undefined) {
          throw new RangeError(
            `Cannot join the coil ${name}: it has a centre tap, a node is needed`,
          );
        }
        return tap;
      case "plus_silicon":
        return `${name} silicon plus`;
      case "minus_silicon":
        return `${name} silicon minus`;
    }
  };
  const pair = ([a, b]: readonly [CoilNode, CoilNode]) => [nodeOf(a), nodeOf(b)] as const;
  return coil.elements(frequency).map((element: CoilElement): CircuitElement => {
    switch (element.kind) {
      case "windings":
        return {
          kind: "inductor",
          name,
          windings: element.windings.map((winding) => ({ ...winding, nodes: pair(winding.nodes) })),
          coupling: element.coupling,
          temperature,
        };
      case "capacitor":
        return { ...element, name: `${name} ${element.name}`, nodes: pair(element.nodes) };
      case "resistor":
        return {
          ...element,
          name: `${name} ${element.name}`,
          nodes: pair(element.nodes),
          temperature,
        };
    }
  });
}
