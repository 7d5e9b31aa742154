/**
 * Spirals with their inductance by the three closed forms and by filaments, nH, lengths in um.
 *
 * Closed forms: S. S. Mohan, M. del Mar Hershenson, S. P. Boyd, T. H. Lee, IEEE J. Solid-State Circuits 34
 * (1999) 1419, tables I to III, evaluated by an independent program with mu0 = 4 pi 1e-7.
 *
 * Filaments, an independent calculation good to 1 %: `spiral` is a square spiral of 4n sides with the
 * thin-tape self inductance of C. Hoer, C. Love, J. Res. NBS 69C (1965) 127, and width-averaged mutual
 * inductances of F. W. Grover, Inductance Calculations (1946), uniform current; `concentric` is closed
 * polygons or circles at the geometric mean distance 0.22313 w.
 *
 * @module
 */
import type { SpiralGeometry, SpiralShape } from "../../lib/device/inductor_geometry.ts";

export interface SpiralVector {
  readonly geometry: SpiralGeometry;
  readonly modifiedWheeler: number | undefined;
  readonly currentSheet: number;
  readonly monomial: number | undefined;
  readonly spiral: number | undefined;
  readonly concentric: number;
}

type Row = readonly [
  shape: SpiralShape,
  turns: number,
  width: number,
  spacing: number,
  outerDiameter: number,
  modifiedWheeler: number | undefined,
  currentSheet: number,
  monomial: number | undefined,
  spiral: number | undefined,
  concentric: number,
];

const none = undefined;

// deno-fmt-ignore
const ROWS: readonly Row[] = [
  ["square", 2, 10, 2, 150, 1.022337514654315, 1.0309198231361185, 1.031694251381917, 1.0139065778891954, 1.0248623262429026],
  ["square", 3, 10, 2, 200, 2.810263512968734, 2.808126935989687, 2.797519127504748, 2.7773966204902467, 2.791971331237019],
  ["square", 4, 8, 2, 200, 4.633173032006524, 4.606020947062151, 4.5497382418598855, 4.565538199182298, 4.580125204304408],
  ["square", 5, 8, 2, 250, 8.980944285352164, 8.924735814330477, 8.774701884519493, 8.864041783734319, 8.881839460602121],
  ["square", 3, 15, 3, 300, 4.215395269453102, 4.212190403984531, 4.218455868085453, 4.166094930735372, 4.187956996855523],
  ["square", 5, 10, 5, 300, 9.204383153071388, 9.102981514231367, 9.047792048763432, 9.040150290911038, 9.061929962604912],
  ["square", 7, 7, 2, 300, 20.23438652273628, 20.068758032361043, 19.55993728971626, 19.970380532878764, 19.991304934055513],
  ["square", 6, 5, 2, 150, 5.82225083304489, 5.7567593857757, 5.611988477164957, 5.716820391108273, 5.727443684117814],
  ["square", 2, 20, 4, 400, 3.125124543450341, 3.2299628608251605, 3.2435649841282816, 3.1894257688850605, 3.2145272062603274],
  ["square", 8, 10, 2, 400, 31.216528308945477, 30.87025093979979, 30.076211180416493, 30.736720032010012, 30.766355283396976],
  ["square", 10, 5, 2, 300, 37.77353834741306, 37.3718385882947, 36.10688057822236, 37.2416775127418, 37.261859784081274],
  ["hexagonal", 2, 10, 2, 150, 0.9049569508005837, 0.9004783368938674, 0.9072731447899223, none, 0.910193447967432],
  ["hexagonal", 3, 10, 2, 200, 2.454193833437687, 2.450298823093089, 2.473739156711704, none, 2.4818396326005994],
  ["hexagonal", 4, 8, 2, 200, 4.002682457817707, 4.014321293862091, 4.028959651084849, none, 4.074357647506793],
  ["hexagonal", 5, 8, 2, 250, 7.750717346491374, 7.777194400860251, 7.821157318418886, none, 7.901436384235173],
  ["hexagonal", 3, 15, 3, 300, 3.6812907501565313, 3.6754482346396338, 3.7211553515884366, none, 3.7227594489008964],
  ["hexagonal", 5, 10, 5, 300, 7.784947440762309, 7.904847454293559, 7.906326521851548, none, 8.072049733704487],
  ["hexagonal", 2, 20, 4, 400, 2.832227829799053, 2.823682500915958, 2.8819073119336975, none, 2.849283942825463],
  ["octagonal", 2, 10, 2, 150, 0.8990716862255925, 0.8932982380273559, 0.912753414732429, none, 0.8798076601209148],
  ["octagonal", 3, 10, 2, 200, 2.445813707760009, 2.4328494527652706, 2.464221407559663, none, 2.399770241408785],
  ["octagonal", 4, 8, 2, 200, 3.9988231372572303, 3.9888481906764337, 3.984535300061075, none, 3.94065911876214],
  ["octagonal", 5, 8, 2, 250, 7.745071963840636, 7.7284689000532705, 7.6840720457926155, none, 7.642272896805329],
  ["octagonal", 3, 15, 3, 300, 3.668720561640014, 3.6492741791479055, 3.7083414478703483, none, 3.599655362113176],
  ["octagonal", 5, 10, 5, 300, 7.814588622644202, 7.8696018694256304, 7.788997091240955, none, 7.810780475437929],
  ["octagonal", 2, 20, 4, 400, 2.798419350963065, 2.797582335511755, 2.8881264910660733, none, 2.752094566189874],
  ["circular", 2, 10, 2, 150, none, 0.8579899207971194, none, none, 0.8484552656211378],
  ["circular", 3, 10, 2, 200, none, 2.34130530677414, none, none, 2.315032062695815],
  ["circular", 4, 8, 2, 200, none, 3.8454149973987715, none, none, 3.802542566352601],
  ["circular", 5, 8, 2, 250, none, 7.45187743250436, none, none, 7.374437523245677],
  ["circular", 3, 15, 3, 300, none, 3.51195796016121, none, none, 3.4725480940438005],
  ["circular", 5, 10, 5, 300, none, 7.616827759370972, none, none, 7.540475872837752],
  ["circular", 2, 20, 4, 400, none, 2.678770488259618, none, none, 2.6513888572666064],
];

export const SPIRAL_VECTORS: readonly SpiralVector[] = ROWS.map((row) => {
  const [shape, turns, width, spacing, outerDiameter, ...values] = row;
  const [modifiedWheeler, currentSheet, monomial, spiral, concentric] = values;
  return {
    geometry: {
      shape,
      turns,
      width: width * 1e-6,
      spacing: spacing * 1e-6,
      outerDiameter: outerDiameter * 1e-6,
    },
    modifiedWheeler,
    currentSheet,
    monomial,
    spiral,
    concentric,
  };
});
