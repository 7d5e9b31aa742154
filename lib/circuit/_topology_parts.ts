/**
 * Pieces that several topologies are made of.
 *
 * @module
 */
import { resolvePassives } from "../device/resolve_passives.ts";
import type { PassiveFactors } from "../device/resolve_passives.ts";
import type { CoilModel } from "../device/inductor_model.ts";
import { resolveTransistor } from "../device/resolve_transistor.ts";
import type { TechnologyCard } from "../device/technology_card.ts";
import { Transistor } from "../device/transistor.ts";
import type { TransistorOperatingPoint } from "../device/transistor_operating_point.ts";
import type { TransistorSize } from "../device/transistor_parameters.ts";
import type { Circuit } from "./circuit.ts";
import { coilElements } from "./coil_elements.ts";
import { type CircuitElement, type DeviceElement, GROUND, transistorElement } from "./element.ts";
import { tankResistance } from "./tank_resistance.ts";
import type {
  BuiltOscillator,
  Condition,
  CoreValues,
  TankDesign,
  WatchedVoltage,
} from "./topology.ts";

/** Coupling of the halves of a coil whose design does not say. */
const DEFAULT_COUPLING = 0.6;
/** Part of the supply that a kick deflects the tank by, peak of the tank voltage. */
const KICK = 0.8;

/** Capacitance a tank has at least, the devices' own, for the guess of its period [F]. */
const LEAST_CAPACITANCE = 50e-15;

/** Name of the supply's node. */
export const SUPPLY = "supply";

/** Terminals of a transistor by node. */
export interface Terminals {
  readonly drain: string;
  readonly gate: string;
  readonly source: string;
  readonly bulk: string;
}

/** What the pieces of one circuit share. */
export interface Workshop {
  readonly condition: Condition;
  readonly passives: PassiveFactors;
  /** A transistor element of a kind at the condition. */
  transistor(
    name: string,
    options: { readonly kind: "n" | "p"; readonly size: TransistorSize; readonly at: Terminals },
  ): DeviceElement;
}

/** The card at a condition, ready to make pieces. */
export function workshop(
  card: TechnologyCard,
  { condition, flavour = "regular" }: {
    readonly condition: Condition;
    readonly flavour?: string | undefined;
  },
): Workshop {
  const { corner, temperature } = condition;
  return {
    condition,
    passives: resolvePassives(card, { corner, temperature }),
    transistor: (name, { kind, size, at }) => {
      const parameters = resolveTransistor(card, { kind, flavour, corner, temperature });
      return transistorElement(name, new Transistor(parameters, size), at);
    },
  };
}

/**
 * @param action what cannot be done otherwise: "build the pair"
 * @throws RangeError naming the first value that is not positive
 */
export function demandPositive(
  action: string,
  values: Readonly<Record<string, readonly [value: number, unit: string]>>,
): void {
  for (const [name, [value, unit]] of Object.entries(values)) {
    if (!(value > 0 && value < Infinity)) {
      throw new RangeError(
        `Cannot ${action}: ${name} must be > 0 ${unit}, got ${value} ${unit}`.replaceAll(
          / (?=,|$)/g,
          "",
        ),
      );
    }
  }
}

/** A coil of two coupled halves from `plus` over its centre tap to `minus`. */
export function tappedCoil(
  { inductance, coupling = DEFAULT_COUPLING }: TankDesign,
  { tap, temperature }: { readonly tap: string; readonly temperature: number },
): CircuitElement {
  const half = inductance / (2 * (1 + coupling));
  return {
    kind: "inductor",
    name: "coil",
    windings: [
      { nodes: ["plus", tap], inductance: half, seriesResistance: 0 },
      { nodes: [tap, "minus"], inductance: half, seriesResistance: 0 },
    ],
    coupling,
    temperature,
  };
}

/** A centre-tapped tank: coil, its loss on each side, capacitor between the outputs. */
export function tappedTank(
  tank: TankDesign,
  { tap, shop: { passives, condition: { temperature } } }: {
    readonly tap: string;
    readonly shop: Workshop;
  },
): CircuitElement[] {
  const capacitor = capacitors([
    ["tank capacitor", ["plus", "minus"], tank.capacitance * passives.capacitor],
  ]);
  if (tank.coil) {
    const place = {
      plus: "plus",
      minus: "minus",
      tap,
      frequency: tank.qualityFrequency,
      temperature,
    };
    const coil = coilElements("coil", tank.coil, place);
    return [...coil.map((element) => heated(element, passives.metalResistance)), ...capacitor];
  }
  const resistance = tankResistance(tank) / passives.metalResistance;
  return [
    tappedCoil(tank, { tap, temperature }),
    ...(["plus", "minus"] as const).map((node): CircuitElement => ({
      kind: "resistor",
      name: `tank loss ${node}`,
      nodes: [tap, node],
      resistance: resistance / 2,
      temperature,
    })),
    ...capacitor,
  ];
}

/** A coil whose metal resists by a factor more; one without a tap is refused. */
function heated(element: CircuitElement, factor: number): CircuitElement {
  if (element.kind !== "inductor") return element;
  if (element.windings.length !== 2) {
    throw new RangeError("Cannot build the tank: its coil must have a centre tap, got one winding");
  }
  return {
    ...element,
    windings: element.windings.map((winding) => ({
      ...winding,
      seriesResistance: winding.seriesResistance * factor,
    })),
  };
}

/** Names of what makes the loss of a centre-tapped tank. */
export function tankLosses({ coil, qualityFrequency }: TankDesign): string[] {
  if (!coil) return ["tank loss plus", "tank loss minus"];
  const resistors = coil.elements(qualityFrequency).flatMap((element) =>
    element.kind === "resistor" ? [`coil ${element.name}`] : []
  );
  return ["coil", ...resistors];
}

/** Capacitors; those of 0 F or undefined are left out. */
export function capacitors(
  list: readonly (readonly [
    name: string,
    nodes: readonly [string, string],
    capacitance: number | undefined,
  ])[],
): CircuitElement[] {
  return list.flatMap(([name, nodes, capacitance]): CircuitElement[] =>
    capacitance === undefined || capacitance === 0
      ? []
      : [{ kind: "capacitor", name, nodes, capacitance }]
  );
}

/** A current mirror: the diode-connected input with its reference current, and its outputs. */
export function mirroredSources(
  shop: Workshop,
  { kind, size, current, mirrorRatio, outputs }: {
    readonly kind: "n" | "p";
    /** Size of each output transistor. */
    readonly size: TransistorSize;
    /** What one output would carry as an ideal copy [A]. */
    readonly current: number;
    readonly mirrorRatio: number;
    /** Names of the output transistors and the nodes of their drains. */
    readonly outputs: readonly (readonly [name: string, drain: string])[];
  },
): CircuitElement[] {
  const rail = kind === "n" ? GROUND : SUPPLY;
  const at = (drain: string) => ({ drain, gate: "mirror", source: rail, bulk: rail });
  return [
    ...outputs.map(([name, drain]) => shop.transistor(name, { kind, size, at: at(drain) })),
    shop.transistor("mirror", {
      kind,
      size: { ...size, width: size.width / mirrorRatio },
      at: at("mirror"),
    }),
    {
      kind: "current",
      name: "reference current",
      nodes: kind === "n" ? [SUPPLY, "mirror"] : ["mirror", GROUND],
      current: current / mirrorRatio,
    },
  ];
}

/** The voltages watched on each of the named transistors. */
export function watchedTransistors(
  { elements }: Circuit,
  names: readonly string[],
): WatchedVoltage[] {
  return names.flatMap((device): WatchedVoltage[] => {
    const element = elements.find(({ name }) => name === device);
    const [drain, gate, source, bulk] = element?.kind === "device" ? element.nodes : [];
    if (
      drain === undefined || gate === undefined || source === undefined || bulk === undefined
    ) {
      throw new RangeError(`Cannot watch "${device}": it must be a transistor of the circuit`);
    }
    return [
      { device, quantity: "gate-source", plus: gate, minus: source },
      { device, quantity: "gate-drain", plus: gate, minus: drain },
      { device, quantity: "drain-source", plus: drain, minus: source },
      { device, quantity: "drain-bulk", plus: drain, minus: bulk },
    ];
  });
}

/** The conduction current that leaves a held node into the elements, as a function of the state [A]. */
export function currentLeaving(circuit: Circuit, node: string): (x: Float64Array) => number {
  const terms: ((x: Float64Array) => number)[] = [];
  for (const element of circuit.elements) {
    switch (element.kind) {
      case "resistor": {
        const [a, b] = element.nodes;
        const sign = a === node ? 1 : b === node ? -1 : 0;
        if (sign !== 0) terms.push((x) => sign * circuit.voltage(a, b, x) / element.resistance);
        break;
      }
      case "current": {
        const sign = element.nodes[0] === node ? 1 : element.nodes[1] === node ? -1 : 0;
        if (sign !== 0) terms.push(() => sign * element.current);
        break;
      }
      case "inductor":
        element.windings.forEach(({ nodes: [a, b] }, k) => {
          const sign = a === node ? 1 : b === node ? -1 : 0;
          if (sign !== 0) terms.push((x) => sign * circuit.windingCurrent(element.name, k, x));
        });
        break;
      case "device": {
        const own = element.nodes.flatMap((name, k) => name === node ? [k] : []);
        if (own.length === 0) break;
        terms.push((x) => {
          const currents = circuit.deviceCurrents(element.name, x);
          return own.reduce((sum, k) => sum + (currents[k] ?? NaN), 0);
        });
        break;
      }
      case "capacitor":
      case "potential":
    }
  }
  return (x) => terms.reduce((sum, term) => sum + term(x), 0);
}

/** Operating point of a named transistor at a state. */
export function operatingPointIn(
  circuit: Circuit,
  device: string,
  x: Float64Array,
): TransistorOperatingPoint {
  const element = circuit.elements.find(({ name }) => name === device);
  if (element?.kind !== "device" || !element.transistor) {
    throw new RangeError(`Cannot read an operating point: there is no transistor "${device}"`);
  }
  const [d, g, s, b] = element.nodes.map((node) => circuit.potential(node, x));
  return element.transistor.operatingPoint(d ?? NaN, g ?? NaN, s ?? NaN, b ?? NaN);
}

/**
 * The core's values from one transistor of it, whose twin's noise and transconductance are alike.
 *
 * @param of the transconductance that the loop gain counts: of the gate or of the source
 */
export function coreOf(
  circuit: Circuit,
  device: string,
  { of }: { readonly of: "gm" | "gms" },
): (state: Float64Array) => CoreValues {
  return (state) => {
    const point = operatingPointIn(circuit, device, state);
    return {
      transconductance: point[of],
      gamma: point.noiseConductance / point[of],
      outputConductance: point.gds,
    };
  };
}

/** The tank port of a topology with differential outputs. */
export function differentialTank(
  { tank, resistance }: { readonly tank: TankDesign; readonly resistance: number },
): BuiltOscillator["tank"] {
  return {
    plus: "plus",
    minus: "minus",
    inductance: tank.inductance,
    conductance: tank.coil ? (angular) => lossOf(tank.coil!, angular) : () => 1 / resistance,
  };
}

/** Loss of a coil as a conductance across its ends [S] at an angular frequency. */
function lossOf(coil: CoilModel, angularFrequency: number): number {
  return coil.admittance(angularFrequency / (2 * Math.PI)).re;
}

/**
 * A start away from the equilibrium: the outputs apart by 0.8 of the supply, the coil without current
 * but for what `potentials` implies, and the period of coil and capacitance.
 */
export function differentialKick(
  circuit: Circuit,
  { potentials, supply, inductance, capacitance }: {
    /** Potentials at rest [V], outputs included. */
    readonly potentials: Readonly<Record<string, number>>;
    readonly supply: number;
    readonly inductance: number;
    readonly capacitance: number;
  },
): NonNullable<BuiltOscillator["kick"]> {
  const { plus = supply, minus = supply } = potentials;
  const apart = KICK * supply / 2;
  return {
    state: circuit.stateAt({ ...potentials, plus: plus + apart, minus: minus - apart }),
    period: 2 * Math.PI * Math.sqrt(inductance * Math.max(capacitance, LEAST_CAPACITANCE)),
  };
}
