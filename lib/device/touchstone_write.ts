import { unitFactor } from "./_touchstone_data.ts";
import { FREQUENCY_UNIT } from "./_touchstone_options.ts";
import type { NetworkData, NetworkFormat, NetworkFrequencyUnit } from "./touchstone_network.ts";

/** Options of {@linkcode writeTouchstone}. */
export interface WriteTouchstoneOptions {
  /** @default "1.0" */
  readonly version?: "1.0" | "2.0";
  /** @default "RI" */
  readonly format?: NetworkFormat;
  /** @default "GHz" */
  readonly frequencyUnit?: NetworkFrequencyUnit;
  /** Significant digits of every number, 1 to 17. @default 12 */
  readonly digits?: number;
  /** Of a two-port in version 2. @default "12_21" */
  readonly twoPortOrder?: "12_21" | "21_12";
  /** Comment lines at the top. @default none */
  readonly comments?: readonly string[];
}

const USUAL_DIGITS = 12;
const MOST_DIGITS = 17;

/**
 * Writes a network as the text of a Touchstone file.
 *
 * @throws {RangeError} when the digits are out of range, a comment holds a line break, a zero is to be
 *   written in decibels, or a first-version file cannot hold the references or the noise parameters
 * @see IBIS Open Forum, Touchstone File Format Specification, version 2.0 (2009)
 */
export function writeTouchstone(
  network: NetworkData,
  options: WriteTouchstoneOptions = {},
): string {
  const { version = "1.0", format = "RI", frequencyUnit = "GHz", digits = USUAL_DIGITS } = options;
  const { twoPortOrder = "12_21", comments = [] } = options;
  if (!(Number.isInteger(digits) && digits >= 1 && digits <= MOST_DIGITS)) {
    throw new RangeError(
      `Cannot write the network: digits must lie from 1 to ${MOST_DIGITS}, got ${digits}`,
    );
  }
  for (const comment of comments) {
    if (/[\r\n]/.test(comment)) {
      throw new RangeError(
        `Cannot write the network: a comment must be one line, got ${JSON.stringify(comment)}`,
      );
    }
  }
  const { ports, parameter, frequencies, noise } = network;
  const first = version === "1.0";
  const reference = commonReference(network, first);
  if (first) demandFallBack(network);
  const show = (value: number) => value.toPrecision(digits);
  const lines = comments.map((comment) => `! ${comment}`);
  if (!first) lines.push("[Version] 2.0");
  lines.push(`# ${frequencyUnit} ${parameter} ${format} R ${reference}`);
  if (!first) {
    lines.push(`[Number of Ports] ${ports}`);
    if (ports === 2) lines.push(`[Two-Port Data Order] ${twoPortOrder}`);
    lines.push(`[Number of Frequencies] ${frequencies.length}`);
    if (noise.length > 0) lines.push(`[Number of Noise Frequencies] ${noise.length}`);
    lines.push(`[Reference] ${network.referenceResistances.join(" ")}`);
    lines.push("[Network Data]");
  }
  const places = ports === 1
    ? [0]
    : first || twoPortOrder === "21_12"
    ? [0, 2, 1, 3]
    : [0, 1, 2, 3];
  const unit = FREQUENCY_UNIT[frequencyUnit];
  frequencies.forEach((frequency, index) => {
    const words = [show(frequency / unit)];
    for (const place of places) {
      const at = index * ports * ports + place;
      const factor = first ? unitFactor({ parameter, referenceResistance: reference }, place) : 1;
      words.push(...pair(network.re[at]! / factor, network.im[at]! / factor, format).map(show));
    }
    lines.push(words.join(" "));
  });
  if (!first && noise.length > 0) lines.push("[Noise Data]");
  for (const point of noise) {
    const { frequency, minimumNoiseFigureDb, sourceReflection, noiseResistance } = point;
    const reflection = pair(sourceReflection.re, sourceReflection.im, "MA");
    const resistance = first ? noiseResistance / reference : noiseResistance;
    lines.push(
      [frequency / unit, minimumNoiseFigureDb, ...reflection, resistance].map(show).join(" "),
    );
  }
  if (!first) lines.push("[End]");
  return lines.join("\n") + "\n";
}

function commonReference({ referenceResistances }: NetworkData, demanded: boolean): number {
  const reference = referenceResistances[0]!;
  if (demanded && referenceResistances.some((each) => each !== reference)) {
    throw new RangeError(
      `Cannot write the network: in version 1.0 all ports must have one reference resistance, got ${
        referenceResistances.join(" and ")
      } ohm`,
    );
  }
  return reference;
}

/** Without a keyword, noise parameters are told by a frequency that does not rise. */
function demandFallBack({ frequencies, noise }: NetworkData): void {
  const begin = noise[0]?.frequency;
  const last = frequencies.at(-1) ?? 0;
  if (begin === undefined || begin <= last) return;
  throw new RangeError(
    `Cannot write the network: in version 1.0 noise parameters must begin at or below the last ` +
      `frequency, ${last} Hz, got ${begin} Hz`,
  );
}

function pair(re: number, im: number, format: NetworkFormat): [number, number] {
  if (format === "RI") return [re, im];
  const magnitude = Math.hypot(re, im);
  const degrees = Math.atan2(im, re) * 180 / Math.PI;
  if (format === "MA") return [magnitude, degrees];
  if (magnitude === 0) {
    throw new RangeError("Cannot write the network: a value in decibels must not be 0, got 0");
  }
  return [20 * Math.log10(magnitude), degrees];
}
