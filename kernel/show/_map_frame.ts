import type { ScaleOptions } from "@observablehq/plot";
import type { InductanceColumn } from "../../lib/design/inductance_map.ts";
import { FRAME } from "./_chart_frame.ts";
import type { ContourPoint, SampledGrid } from "./_contour_lines.ts";
import { axisUnit, type DisplayUnit, withUnit } from "./_display_unit.ts";

/** Measures of a map [px]; the width and the margins at the sides are every drawing's. */
export const MAP = { height: 430, top: 30 } as const;

/** The axes of the map, and its grid in their logarithms. */
export class MapFrame {
  readonly currents: readonly number[];
  readonly unitX: DisplayUnit;
  readonly unitY: DisplayUnit;
  /** In ln A, ln H and dBc/Hz. */
  readonly grid: SampledGrid;
  readonly #x: readonly [number, number];
  readonly #y: readonly [number, number];

  constructor(columns: readonly InductanceColumn[]) {
    const [first] = columns;
    if (!first || columns.length < 2) {
      throw new RangeError(
        `Cannot draw the map: there must be at least 2 columns, got ${columns.length}`,
      );
    }
    this.currents = first.sweep.points.map(({ current }) => current);
    columns.forEach(({ inductance, sweep: { points } }, k) => {
      const same = points.length === this.currents.length &&
        points.every(({ current }, i) => current === this.currents[i]);
      if (!same) {
        throw new TypeError("Cannot draw the map: all columns must have the same currents");
      }
      if (k > 0 && !(inductance > columns[k - 1]!.inductance)) {
        throw new RangeError(
          `Cannot draw the map: inductances must rise, got ${inductance} H after ${
            columns[k - 1]!.inductance
          } H`,
        );
      }
    });
    const inductances = columns.map(({ inductance }) => inductance);
    this.unitX = axisUnit(this.currents, "A");
    this.unitY = axisUnit(inductances, "H");
    this.#x = [this.currents[0]!, this.currents[this.currents.length - 1]!];
    this.#y = [inductances[0]!, inductances[inductances.length - 1]!];
    this.grid = {
      x: this.currents.map(Math.log),
      y: inductances.map(Math.log),
      z: columns.map(({ sweep }) => sweep.points.map(({ figures }) => figures?.phaseNoise ?? NaN)),
    };
  }

  get left(): number {
    return this.#x[0];
  }

  get right(): number {
    return this.#x[1];
  }

  get bottom(): number {
    return this.#y[0];
  }

  get top(): number {
    return this.#y[1];
  }

  holds({ current, inductance }: { readonly current: number; readonly inductance: number }) {
    return current >= this.left && current <= this.right && inductance >= this.bottom &&
      inductance <= this.top;
  }

  /** Place on the page [px]. */
  pixel([x, y]: ContourPoint): ContourPoint {
    const share = (value: number, [low, high]: readonly [number, number]) =>
      (value - Math.log(low)) / Math.log(high / low);
    return [
      FRAME.left + share(x, this.#x) * (FRAME.width - FRAME.left - FRAME.right),
      MAP.height - FRAME.bottom - share(y, this.#y) * (MAP.height - FRAME.bottom - MAP.top),
    ];
  }

  /** A point of the grid in the units of the axes. */
  shown([x, y]: ContourPoint): { x: number; y: number } {
    return { x: this.unitX.from(Math.exp(x)), y: this.unitY.from(Math.exp(y)) };
  }

  axis(name: "x" | "y", label: string): ScaleOptions {
    const unit = name === "x" ? this.unitX : this.unitY;
    const domain = (name === "x" ? this.#x : this.#y).map(unit.from) as [number, number];
    return {
      type: "log",
      domain,
      label: name === "x" ? withUnit(label, unit.unit) : null,
      labelArrow: "none",
      labelAnchor: "center",
      labelOffset: 38,
      ticks: ticksOf(domain),
      tickFormat: (value: number) => String(Number(value.toPrecision(6))),
    };
  }
}

function ticksOf([low, high]: readonly [number, number]): number[] {
  const ticks: number[] = [];
  const steps = high / low > 5 ? [1, 2, 3, 5] : [1, 1.5, 2, 3, 4, 5, 7];
  for (let k = Math.floor(Math.log10(low)); k <= Math.ceil(Math.log10(high)); k++) {
    for (const step of steps) {
      const tick = Number(`${step}e${k}`);
      if (tick >= low && tick <= high) ticks.push(tick);
    }
  }
  return ticks;
}
