import type { Law } from './law.js';
import { normalInnovation } from './normal-innovation.js';

/**
 * Geometric Brownian motion, exact over a step of any length: X′ = X exp((m - s²/2) Δ + s √Δ z), so that the mean of X
 * grows at the rate m.
 *
 * @unit m per clock unit, s per square root of the clock unit
 * @source Black & Scholes (1973), J. Political Economy 81, 637-654; common form
 */
export const lognormal: Law = {
  name: 'lognormal',
  parameters: [
    { key: 'growth of mean', meaning: 'the growth rate of the mean, per clock unit', range: 'finite', default: null },
    {
      key: 'volatility',
      meaning: 'the volatility of the logarithm, per root of the clock unit',
      range: 'not negative',
      default: null,
    },
  ],
  startRange: 'positive',
  innovation: normalInnovation,
  isPositive: true,
  step(graph, { state, shock, duration, parameter }) {
    const volatility = parameter('volatility');
    const drift = graph.subtract(
      parameter('growth of mean'),
      graph.multiply(graph.constant(0.5), graph.multiply(volatility, volatility)),
    );
    const scale = graph.multiply(volatility, graph.apply('squareRoot', duration));
    const exponent = graph.add(graph.multiply(drift, duration), graph.multiply(scale, shock));
    return graph.multiply(state, graph.apply('exponential', exponent));
  },
};
