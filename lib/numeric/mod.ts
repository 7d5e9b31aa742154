/**
 * Dense linear algebra and collocation.
 *
 * @module
 */
export { factor, solve, solveTransposed } from "./lu.ts";
export {
  gaussLegendre,
  type GaussMethod,
  gaussMethod,
  lagrangeBasis,
  lagrangeIntegrals,
} from "./gauss.ts";
