import { type DataLayout, readNetworkData, readNoise } from "./_touchstone_data.ts";
import { readHeader, type TouchstoneHeader } from "./_touchstone_header.ts";
import {
  countOf,
  type LineError,
  type TouchstoneLine,
  touchstoneLines,
} from "./_touchstone_lines.ts";
import { readOptionLine } from "./_touchstone_options.ts";
import type { NetworkData } from "./touchstone_network.ts";

/** Options of {@linkcode readTouchstone}. */
export interface ReadTouchstoneOptions {
  /** Of the file, for messages; an ending .s1p or .s2p tells the number of ports. @default none */
  readonly name?: string;
  /** @default from the name, else from the first line of data */
  readonly ports?: 1 | 2;
}

const VERSIONS = ["2.0", "2.1"];

/**
 * Reads the text of a Touchstone file of one or two ports, version 1 or 2.
 *
 * Parts of the option line that are left out are GHz, S, MA, R 50; further option lines are ignored. The
 * values of a frequency may go on over further lines in whole pairs. In the first version a line of five
 * values whose frequency does not rise begins the noise parameters of a two-port, and Y, Z, H and G are
 * divided by the reference resistance; here they are not.
 *
 * @param text what the file holds
 * @throws {SyntaxError} with the line and what was expected there
 * @throws {RangeError} when the name or the options ask for another number of ports than 1 or 2
 * @see IBIS Open Forum, Touchstone File Format Specification, version 2.0 (2009)
 */
export function readTouchstone(text: string, options: ReadTouchstoneOptions = {}): NetworkData {
  const { name } = options;
  const called = name ?? "the network file";
  const fail: LineError = (line, expected, found) =>
    new SyntaxError(`Cannot read ${called}: line ${line}: expected ${expected}, got ${found}`);
  const lines = touchstoneLines(text, fail);
  const lastLine = Math.max(1, text.split(/\r\n|\n|\r/).length);
  const asked = options.ports ?? portsOfName(name);
  const file = { lines, lastLine, asked, fail };
  return lines[0]?.keyword === "version" ? readSecond(file) : readFirst(file);
}

interface FileParts {
  readonly lines: readonly TouchstoneLine[];
  readonly lastLine: number;
  readonly asked: 1 | 2 | undefined;
  readonly fail: LineError;
}

function portsOfName(name: string | undefined): 1 | 2 | undefined {
  const match = /\.s(\d+)p$/i.exec(name ?? "");
  if (!match) return undefined;
  const ports = Number(match[1]);
  if (ports === 1 || ports === 2) return ports;
  throw new RangeError(
    `Cannot read ${name}: a coil's file must have 1 or 2 ports, got ${ports} by its name`,
  );
}

function readFirst({ lines, lastLine, asked, fail }: FileParts): NetworkData {
  const [head, ...rest] = lines;
  if (head === undefined) throw fail(lastLine, "an option line beginning with #", "no data");
  if (head.kind === "keyword") {
    throw fail(head.number, "[Version] 2.0 before any other keyword", `[${head.keyword}]`);
  }
  if (head.kind !== "option") {
    throw fail(
      head.number,
      "an option line beginning with # before the data",
      `"${head.words.join(" ")}"`,
    );
  }
  const option = readOptionLine(head, fail);
  const stray = rest.find((line) => line.kind === "keyword");
  if (stray) {
    throw fail(
      stray.number,
      "data (keywords need [Version] 2.0 as the first line)",
      `[${stray.keyword}]`,
    );
  }
  const data = rest.filter((line) => line.kind === "data");
  if (data.length === 0) throw fail(lastLine, "data after the option line", "none");
  const ports = asked ?? portsOfData(data[0]!, fail);
  const layout: DataLayout = {
    ports,
    order: "21_12",
    matrix: "full",
    options: option,
    noiseFollows: ports === 2,
    normalised: true,
  };
  demandParameter(layout, head.number, fail);
  const { frequencies, re, im, next } = readNetworkData(data, layout, fail);
  return network(layout, {
    references: undefined,
    frequencies,
    re,
    im,
    noise: readNoise(data.slice(next), layout, fail),
  });
}

/** A file without a telling name: 3 values a line have one port, 9 have two. */
function portsOfData({ number, words }: TouchstoneLine, fail: LineError): 1 | 2 {
  if (words.length === 3) return 1;
  if (words.length === 9) return 2;
  throw fail(
    number,
    "3 values (one port) or 9 values (two ports), or a name ending in .s1p or .s2p",
    countOf(words.length, "value"),
  );
}

function readSecond({ lines, lastLine, asked, fail }: FileParts): NetworkData {
  const version = lines[0]!;
  if (version.words.length !== 1 || !VERSIONS.includes(version.words[0] ?? "")) {
    throw fail(
      version.number,
      `[Version] ${VERSIONS.join(" or ")}`,
      `"${version.words.join(" ")}"`,
    );
  }
  const content = withoutInformation(lines.slice(1), fail);
  const optionLine = content[0];
  if (optionLine?.kind !== "option") {
    throw fail(
      optionLine?.number ?? lastLine,
      "an option line beginning with # after [Version]",
      optionLine
        ? (optionLine.keyword ? `[${optionLine.keyword}]` : `"${optionLine.words.join(" ")}"`)
        : "the end of the file",
    );
  }
  const option = readOptionLine(optionLine, fail);
  const body = content.filter((line) => line.kind !== "option");
  const { header, next } = readHeader(body, { lastLine, fail });
  if (asked !== undefined && asked !== header.ports) {
    const line = body.find((each) => each.keyword === "number of ports")!.number;
    throw fail(line, `[Number of Ports] ${asked}, as the file is called`, `${header.ports}`);
  }
  const layout: DataLayout = {
    ports: header.ports,
    order: header.order,
    matrix: header.matrix,
    options: option,
    noiseFollows: false,
    normalised: false,
  };
  demandParameter(layout, optionLine.number, fail);
  const { network: networkLines, noise: noiseLines, end } = sections(body.slice(next), {
    header,
    lastLine,
    fail,
  });
  const { frequencies, lines: starts, re, im } = readNetworkData(networkLines, layout, fail);
  demandCount("frequency point", frequencies.length, {
    wanted: header.frequencies,
    extra: starts[header.frequencies],
    end: noiseLines?.line ?? end,
    fail,
  });
  const noise = noiseLines ? readNoise(noiseLines.lines, layout, fail) : [];
  if (noiseLines) {
    demandCount("noise frequency point", noise.length, {
      wanted: header.noiseFrequencies,
      extra: noiseLines.lines[header.noiseFrequencies]?.number,
      end,
      fail,
    });
  }
  return network(layout, { references: header.references, frequencies, re, im, noise });
}

/** Hybrid parameters exist for two ports only. */
function demandParameter({ ports, options }: DataLayout, line: number, fail: LineError): void {
  const { parameter } = options;
  if (ports === 1 && (parameter === "H" || parameter === "G")) {
    throw fail(line, "S, Y or Z parameters of a one-port", parameter);
  }
}

/** Leaves out what stands between [Begin Information] and [End Information]. */
function withoutInformation(lines: readonly TouchstoneLine[], fail: LineError): TouchstoneLine[] {
  const kept: TouchstoneLine[] = [];
  let begun: number | undefined;
  for (const line of lines) {
    if (begun !== undefined) {
      if (line.keyword === "end information") begun = undefined;
    } else if (line.keyword === "begin information") begun = line.number;
    else kept.push(line);
  }
  if (begun !== undefined) {
    throw fail(begun, "[End Information] after [Begin Information]", "none");
  }
  return kept;
}

interface Sections {
  readonly network: readonly TouchstoneLine[];
  readonly noise: { readonly line: number; readonly lines: readonly TouchstoneLine[] } | undefined;
  /** Line of [End]. */
  readonly end: number;
}

/** Cuts what follows [Network Data]. */
function sections(
  lines: readonly TouchstoneLine[],
  { header, lastLine, fail }: { header: TouchstoneHeader; lastLine: number; fail: LineError },
): Sections {
  const endAt = lines.findIndex((line) => line.keyword === "end");
  if (endAt < 0) throw fail(lastLine, "[End]", "the end of the file");
  const end = lines[endAt]!.number;
  const after = lines[endAt + 1];
  if (after) throw fail(after.number, "nothing after [End]", `"${after.words.join(" ")}"`);
  const inside = lines.slice(0, endAt);
  const noiseAt = inside.findIndex((line) => line.keyword === "noise data");
  const stray = inside.find((line, index) => line.kind === "keyword" && index !== noiseAt);
  if (stray) throw fail(stray.number, "data, [Noise Data] or [End]", `[${stray.keyword}]`);
  if (noiseAt < 0) {
    if (header.noiseFrequencies > 0) {
      throw fail(end, `[Noise Data] with ${countOf(header.noiseFrequencies, "line")}`, "[End]");
    }
    return { network: inside, noise: undefined, end };
  }
  const line = inside[noiseAt]!.number;
  if (header.ports !== 2) throw fail(line, "no noise parameters with one port", "[Noise Data]");
  if (header.noiseFrequencies === 0) {
    throw fail(line, "[Number of Noise Frequencies] before [Network Data]", "none");
  }
  return {
    network: inside.slice(0, noiseAt),
    noise: { line, lines: inside.slice(noiseAt + 1) },
    end,
  };
}

function demandCount(
  what: string,
  found: number,
  { wanted, extra, end, fail }: {
    wanted: number;
    extra: number | undefined;
    end: number;
    fail: LineError;
  },
): void {
  if (found === wanted) return;
  throw fail(
    found > wanted ? extra ?? end : end,
    `${countOf(wanted, what)} as declared`,
    `${found}`,
  );
}

function network(
  { ports, options }: DataLayout,
  { references, frequencies, re, im, noise }: {
    references: readonly number[] | undefined;
    frequencies: readonly number[];
    re: readonly number[];
    im: readonly number[];
    noise: NetworkData["noise"];
  },
): NetworkData {
  const { parameter, referenceResistance } = options;
  return {
    ports,
    parameter,
    referenceResistances: references ?? Array.from({ length: ports }, () => referenceResistance),
    frequencies: Float64Array.from(frequencies),
    re: Float64Array.from(re),
    im: Float64Array.from(im),
    noise,
  };
}
