import { GROUNDS, SERIES_COLORS, seriesStyle } from "../../../kernel/show/palette.ts";
import { assert, assertEquals } from "../../assert.ts";

function linear(hex: string): [number, number, number] {
  const channels = [1, 3, 5].map((at) => parseInt(hex.slice(at, at + 2), 16) / 255);
  // sRGB transfer function, IEC 61966-2-1.
  return channels.map((c) => c <= 0.04045 ? c / 12.92 : ((c + 0.055) / 1.055) ** 2.4) as [
    number,
    number,
    number,
  ];
}

function luminance([r, g, b]: readonly [number, number, number]): number {
  return 0.2126 * r + 0.7152 * g + 0.0722 * b;
}

/** Contrast ratio, WCAG 2.2, "contrast ratio". */
function contrast(a: string, b: string): number {
  const [low, high] = [luminance(linear(a)), luminance(linear(b))].sort((x, y) => x - y);
  return (high! + 0.05) / (low! + 0.05);
}

/**
 * How the colour-blind see linear RGB: G. M. Machado, M. M. Oliveira, L. A. F. Fernandes, "A
 * physiologically-based model for simulation of color vision deficiency", IEEE TVCG 15 (2009) 1291,
 * severity 1.0. The coefficients are from memory; each row adds up to 1, as the paper requires.
 */
const SEEN = {
  protanopia: [
    [0.152286, 1.052583, -0.204868],
    [0.114503, 0.786281, 0.099216],
    [-0.003882, -0.048116, 1.051998],
  ],
  deuteranopia: [
    [0.367322, 0.860646, -0.227968],
    [0.280085, 0.672501, 0.047413],
    [-0.01182, 0.04294, 0.968881],
  ],
} as const;

/** Distance in CIE L*a*b* (CIE 15, D65). */
function distance(a: readonly number[], b: readonly number[]): number {
  const lab = ([r, g, bl]: readonly number[]) => {
    const f = (t: number) => t > (6 / 29) ** 3 ? Math.cbrt(t) : t / (3 * (6 / 29) ** 2) + 4 / 29;
    const x = f((0.4124 * r! + 0.3576 * g! + 0.1805 * bl!) / 0.9505);
    const y = f(0.2126 * r! + 0.7152 * g! + 0.0722 * bl!);
    const z = f((0.0193 * r! + 0.1192 * g! + 0.9505 * bl!) / 1.089);
    return [116 * y - 16, 500 * (x - y), 200 * (y - z)];
  };
  const [p, q] = [lab(a), lab(b)];
  return Math.hypot(...p.map((v, i) => v - q[i]!));
}

Deno.test("SERIES_COLORS: each has 3:1 against the ground it is for (WCAG 2.2, 1.4.11)", () => {
  for (const { light, dark, either } of SERIES_COLORS) {
    assert(contrast(light, GROUNDS.light) >= 3, `${light} on light`);
    assert(contrast(dark, GROUNDS.dark) >= 3, `${dark} on dark`);
    assert(contrast(either, GROUNDS.light) >= 3, `${either} on light`);
    assert(contrast(either, GROUNDS.dark) >= 3, `${either} on dark`);
  }
});

Deno.test("SERIES_COLORS: the first three, which most charts use, differ for the colour-blind too", () => {
  // Ten units of L*a*b* are several times what is just noticed side by side (common practice: 2.3).
  for (const ground of ["light", "dark", "either"] as const) {
    for (const matrix of Object.values(SEEN)) {
      const seen = SERIES_COLORS.slice(0, 3).map((color) => {
        const rgb = linear(color[ground]);
        return matrix.map((row) => Math.max(0, row.reduce((sum, m, i) => sum + m * rgb[i]!, 0)));
      });
      for (const [i, j] of [[0, 1], [0, 2], [1, 2]] as const) {
        assert(distance(seen[i]!, seen[j]!) >= 10, `${ground}: ${i} and ${j}`);
      }
    }
  }
});

Deno.test("seriesStyle: no two of the first twelve series are drawn alike, and neighbours differ in dash", () => {
  const styles = Array.from({ length: 12 }, (_, i) => seriesStyle(i));
  assertEquals(new Set(styles.map((style) => JSON.stringify(style))).size, 12);
  for (let i = 1; i < 12; i++) {
    assert(styles[i]!.dash !== styles[i - 1]!.dash);
    assert(styles[i]!.symbol !== styles[i - 1]!.symbol);
  }
});
