import { choice, fixed } from "../../../kernel/sheet/field.ts";
import { type Declaration, declarationOf } from "../../../kernel/sheet/declaration.ts";

/** Two small sheets that share a field; invented. */
export const FIRST: Declaration = declarationOf("first_sheet", {
  supply_voltage: choice("V", {
    question: "Which supply feeds the tank?",
    atLeast: "0.6 V",
    atMost: "1.4 V",
  }),
  knee_multiple: fixed("1", "0.9", {
    question: "How far above the knee is the bias?",
    reason: "house rule",
  }),
  topology: choice("word", { question: "Which pair?", options: ["nmos_pair", "pmos_pair"] }),
});

export const SECOND: Declaration = declarationOf("second_sheet", {
  supply_voltage: choice("V", { question: "Which supply feeds the tank?", atMost: "1.2 V" }),
  quality_factor: choice("1", { question: "Which quality factor?", atLeast: "1" }),
});

/** A revision that fills both. */
export const GOOD = `design: Test oscillator
revision: 2
author: A. Tester
review_date: 2026-11-16
card: card.yaml
templates: [first_sheet, second_sheet]
fields:
  supply_voltage: { value: "1.0 V", reason: the regulator gives it, estimate: about 1 V }
  topology:
    value: nmos_pair
    reason: fastest
  quality_factor: { value: 12.50, reason: "measured" }
waivers:
  - { template: first_sheet, verdict: swing, reason: known, by: lead, expires: 2027-01-31 }
`;
