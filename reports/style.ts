import { SERIES_COLORS } from "../kernel/show/palette.ts";

function seriesVariables(ground: "light" | "dark"): string {
  return SERIES_COLORS.map((color, i) => `--series-${i + 1}: ${color[ground]};`).join(" ");
}

// The dark ground is the one that the palette is made for.
const DARK = `
  --ground: #14181b; --raised: #1c2226; --ink: #e6e3da; --quiet: #a9b1b5; --line: #3a4348;
  --accent: #8fd0c4; --met: #6fcf9f; --thin: #e6c25a; --missed: #ff9a7d; --waived: #cfa6ea;
  --not-run: #b9c3c9; ${seriesVariables("dark")}`;

/** The page's one style sheet: quiet paper in the light, in the dark, on a phone and in print. */
export const STYLE = `
:root {
  color-scheme: light dark;
  --ground: #fbfaf6; --raised: #f2f0e8; --ink: #1e2428; --quiet: #56616a; --line: #cfcbbd;
  --accent: #11605a; --met: #1d6b45; --thin: #7a5600; --missed: #a8330d; --waived: #68307f;
  --not-run: #4a5560; ${seriesVariables("light")}
}
@media (prefers-color-scheme: dark) { :root {${DARK}} }
* { box-sizing: border-box; }
html { scroll-behavior: auto; scroll-padding-top: 1rem; }
body {
  margin: 0 auto; padding: 0 clamp(1rem, 4vw, 3rem) 4rem; max-width: 68rem;
  background: var(--ground); color: var(--ink);
  font: 1rem/1.55 "Source Sans 3", "Noto Sans", "Segoe UI", "DejaVu Sans", sans-serif;
  overflow-wrap: break-word;
}
h1, h2, h3, h4, h5, h6 {
  font-family: "Source Serif 4", Charter, "Noto Serif", Georgia, "DejaVu Serif", serif;
  font-weight: 600; line-height: 1.2; margin: 2rem 0 .6rem;
}
h1 { font-size: clamp(1.6rem, 4.5vw, 2.3rem); margin: .2rem 0 1rem; }
h2 { font-size: 1.5rem; margin-top: 3.2rem; padding-top: .8rem; border-top: 3px double var(--line); }
h3 { font-size: 1.15rem; }
h4, h5, h6 { font-size: 1rem; }
p, ul, ol, dl, blockquote { max-width: 46rem; }
a { color: var(--accent); text-underline-offset: .15em; }
:focus-visible { outline: 3px solid var(--accent); outline-offset: 2px; }
main:focus { outline: none; }
.skip { position: absolute; left: -100rem; }
.skip:focus { left: 1rem; top: .5rem; background: var(--ground); padding: .4rem .8rem; z-index: 1; }
header { padding-top: 2.2rem; }
.kicker { margin: 0; color: var(--accent); letter-spacing: .04em; }
header dl { display: flex; flex-wrap: wrap; gap: .6rem 2.2rem; margin: 0 0 1rem; max-width: none; }
dt { color: var(--quiet); font-size: .85rem; }
dd { margin: 0; }
.card-note { border-left: 4px double var(--accent); padding-left: .9rem; }
nav ol { list-style: none; display: flex; flex-wrap: wrap; gap: .3rem 1.4rem; padding: 0; max-width: none; }
nav li { margin: 0; }
.note { color: var(--quiet); font-size: .9rem; margin: 0 0 1rem; }
code, pre { font-family: "Source Code Pro", "Cascadia Mono", "DejaVu Sans Mono", monospace; font-size: .86em; }
.hash { overflow-wrap: anywhere; }
pre { overflow-x: auto; background: var(--raised); padding: .8rem 1rem; margin: .8rem 0; line-height: 1.4; }
.scroll, .output { overflow-x: auto; }
.output { margin: .8rem 0; }
.output > p { margin: .3rem 0; }
.whole { white-space: nowrap; }
table { border-collapse: collapse; font-size: .92rem; margin: .4rem 0 1rem; }
.scroll table.wide { min-width: 56rem; }
caption { text-align: left; color: var(--quiet); padding-bottom: .4rem; caption-side: top; }
th, td { text-align: left; vertical-align: top; padding: .38rem .9rem .38rem 0; border-bottom: 1px solid var(--line); }
thead th { color: var(--quiet); font-weight: 600; vertical-align: bottom; border-bottom: 2px solid var(--line); }
tbody th { font-weight: 600; }
.figure { text-align: right; font-variant-numeric: tabular-nums; white-space: nowrap; }
.word { white-space: nowrap; font-weight: 700; }
.state { --state: var(--not-run); }
.state.met, .verdict.met { --state: var(--met); }
.state.thin, .verdict.thin { --state: var(--thin); }
.state.missed, .verdict.missed { --state: var(--missed); }
.state.waived, .verdict.waived { --state: var(--waived); }
.verdict.not-run { --state: var(--not-run); }
tr.state > :first-child { border-left: 5px solid var(--state); padding-left: .7rem; }
tr.state .word, .tally .state, p.state strong, p.state.met { color: var(--state); }
tr.missed.state, tr.not-run.state { background: var(--raised); }
p.state, .verdict { border-left: 5px solid var(--state); padding-left: .8rem; }
.verdict strong:first-child { color: var(--state); }
.tally { display: flex; flex-wrap: wrap; gap: .2rem 1.6rem; font-weight: 700; font-size: 1.1rem; }
.error { border-left: 5px solid var(--missed); padding-left: .8rem; white-space: pre-wrap; }
.stderr { border-left: 5px solid var(--thin); }
details.code { margin: 1.2rem 0 .4rem; font-size: .9rem; }
details.code > summary { color: var(--quiet); cursor: pointer; }
figure { margin: 1.4rem 0; }
figcaption { max-width: 46rem; }
svg, img { max-width: 100%; height: auto; }
figure.chart > svg { width: 100%; max-width: min(100%, 42rem) !important; }
math { font-size: 1.08em; }
.formula, math[display="block"] { overflow-x: auto; overflow-y: hidden; padding: .2rem 0; }
.readings { font-size: .92rem; padding-left: 1.2rem; }
footer { margin-top: 3rem; color: var(--quiet); font-size: .88rem; border-top: 1px solid var(--line); }
@media (max-width: 40rem) {
  h2 { font-size: 1.3rem; margin-top: 2.4rem; }
  th, td { padding-right: .7rem; }
  .output table:has(th:nth-child(5)) { min-width: 40rem; }
}
@page { margin: 16mm 14mm; }
@media print {
  :root {
    color-scheme: light;
    --ground: #fff; --raised: #fff; --ink: #000; --quiet: #333; --line: #999; --accent: #000;
    --met: #000; --thin: #000; --missed: #000; --waived: #000; --not-run: #000;
    ${seriesVariables("light")}
  }
  html { font-size: 9.5pt; }
  body { max-width: none; padding: 0; }
  .skip, nav, details.code, a[download] { display: none; }
  h1, h2, h3, h4, h5, h6, caption, thead { break-after: avoid; }
  tr, figure, svg, math, .verdict, p.state, li { break-inside: avoid; }
  thead { display: table-header-group; }
  .scroll, .output, pre, .formula { overflow: visible; }
  .scroll table.wide { min-width: 0; }
  pre { white-space: pre-wrap; border: 1px solid var(--line); }
  a { color: inherit; }
  a[href^="http"]::after { content: " (" attr(href) ")"; font-size: .85em; overflow-wrap: anywhere; }
  figure.chart > svg { max-width: 125mm !important; }
  h2 + .note { break-after: avoid; }
}
`;
