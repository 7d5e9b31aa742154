/**
 * `deno run -A bench/lib/circuit/robustness.ts [count] [name ...]`: how many random startable sizings of each topology
 * have an orbit, why not, and how long one takes from its equilibrium. Sizings: tests/lib/circuit/data/sizing_boxes.json.
 */
import { readCard } from "../../../kernel/sheet/card.ts";
import { oscillation } from "../../../lib/design/oscillation.ts";
import { Orbit } from "../../../lib/orbit/orbit.ts";
import { BOX_NAMES, startableSizings } from "./_sizings.ts";

const CARD = new URL("../../../notebooks/cards/illustrative_65nm.yaml", import.meta.url);
const card = readCard(Deno.readTextFileSync(CARD), CARD.pathname);
const count = Number(Deno.args[0] ?? 20);
const names = Deno.args.length > 1 ? Deno.args.slice(1) : BOX_NAMES;

let [all, allFound, single, singleFound] = [0, 0, 0, 0];
for (const name of names) {
  const { sizings, drawn, noEquilibrium } = startableSizings(name, { count, card });
  const times: number[] = [];
  const failures: string[] = [];
  let found = 0;
  for (const [k, sizing] of sizings.entries()) {
    const { started, oscillator } = sizing;
    const begin = performance.now();
    const result = oscillation(oscillator, sizing);
    times.push(performance.now() - begin);
    const others = started.otherUnstable.length;
    all++;
    if (others === 0) single++;
    if (result instanceof Orbit) {
      found++;
      if (others === 0) singleFound++;
      const ratio = result.frequency / started.frequency;
      if (!(ratio > 0.7 && ratio < 1.4)) failures.push(`${k}: ${ratio} of the startup frequency`);
    } else {
      failures.push(
        `${k}: a = ${
          started.loopGain.toFixed(2)
        }, ${others} other unstable poles: ${result.status}, ${result.reason}`,
      );
    }
  }
  allFound += found;
  times.sort((a, b) => a - b);
  const at = (part: number) => (times[Math.floor(part * (count - 1))] ?? NaN).toFixed(0);
  console.log(
    `${name}: ${found} of ${count} found; ${drawn} drawn, ${noEquilibrium.length} without startup; ms ${
      at(0.5)
    } ` +
      `median, ${at(0.9)} ninth decile, ${at(1)} longest`,
  );
  for (const text of [...failures, ...noEquilibrium]) console.log(`  ${text}`);
}
console.log(
  `all: ${allFound} of ${all} = ${(100 * allFound / all).toFixed(2)} %; with one unstable mode: ` +
    `${singleFound} of ${single} = ${(100 * singleFound / single).toFixed(2)} %`,
);
