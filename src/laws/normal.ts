import type { Law } from './law.js';
import { normalInnovation } from './normal-innovation.js';

/**
 * Brownian motion with drift, exact over a step of any length: X′ = X + m Δ + s √Δ z.
 *
 * @unit m in the driver's unit per clock unit, s in the driver's unit per square root of the clock unit
 * @source Bachelier (1900), Ann. Sci. École Norm. Sup. 17, 21-86; common form
 */
export const normal: Law = {
  name: 'normal',
  parameters: [
    { key: 'drift', meaning: "the drift, in the driver's unit per clock unit", range: 'finite', default: 0 },
    {
      key: 'volatility',
      meaning: "the volatility, in the driver's unit per root of the clock unit",
      range: 'not negative',
      default: null,
    },
  ],
  startRange: 'finite',
  innovation: normalInnovation,
  isPositive: false,
  step(graph, { state, shock, duration, parameter }) {
    const scale = graph.multiply(parameter('volatility'), graph.apply('squareRoot', duration));
    return graph.add(graph.add(state, graph.multiply(parameter('drift'), duration)), graph.multiply(scale, shock));
  },
};
