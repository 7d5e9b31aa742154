/**
 * Dense linear algebra, collocation and splines.
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
export {
  type LeastSquares,
  levenbergMarquardt,
  type LevenbergMarquardtOptions,
} from "./levenberg_marquardt.ts";
export { SplineAxis } from "./spline_axis.ts";
export { TensorSpline } from "./spline_tensor.ts";
