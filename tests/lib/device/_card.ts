/** The shipped card, read the way the notebook side reads it. */
import { parse } from "yaml";
import { type TechnologyCard, technologyCardFrom } from "../../../lib/device/technology_card.ts";
import { parseQuantity } from "../../../lib/quantity/parse_quantity.ts";

const FOLDER = new URL("../../../notebooks/cards/", import.meta.url);

/** Plain data of the illustrative card; a fresh copy at each call. */
export function illustrativeData(): Record<string, unknown> {
  return parse(Deno.readTextFileSync(new URL("illustrative_65nm.yaml", FOLDER)));
}

/** The illustrative card. */
export function illustrativeCard(): TechnologyCard {
  return technologyCardFrom(illustrativeData(), parseQuantity);
}

/** The schema file of the cards. */
export function cardSchema(): Record<string, unknown> {
  return JSON.parse(Deno.readTextFileSync(new URL("technology_card.schema.json", FOLDER)));
}
