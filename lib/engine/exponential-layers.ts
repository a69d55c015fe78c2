import { exp, ln } from './elementary';

/** 256 layers of equal area under e^(-x): where the lowest one's rectangle ends, and the area of each. */
export const EXPONENTIAL_TAIL = 7.69711747013104972;
const AREA = 0.0039496598225815571993;
const LAYERS = 256;

/**
 * Widths of the layers from the lowest to the top, and 0 after the top. The lowest holds the tail as well, so its width is that
 * of a rectangle with the same area.
 *
 * @see Marsaglia & Tsang 2000, "The ziggurat method for generating random variables", J Stat Softw 5(8)
 */
export function exponentialWidths(): Float64Array {
  const widths = new Float64Array(LAYERS + 1);
  widths[0] = AREA * exp(EXPONENTIAL_TAIL);
  widths[1] = EXPONENTIAL_TAIL;
  for (let layer = 2; layer < LAYERS; layer += 1) {
    const below = widths[layer - 1] as number;
    widths[layer] = -ln(AREA / below + exp(-below));
  }
  return widths;
}

/** e^(-width) of each layer, 1 after the top. */
export function exponentialHeights(widths: Float64Array): Float64Array {
  return widths.map((width) => exp(-width));
}
