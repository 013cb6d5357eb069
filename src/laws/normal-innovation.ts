import { exp } from '../program/elementary.js';
import { hermitePolynomial } from '../program/hermite.js';
import type { Innovation } from './innovation.js';

const inverseSquareRootOfTwoPi = 0.3989422804014327;

/** A standard normal innovation with the Hermite polynomials scaled to variance 1. */
export const normalInnovation: Innovation = {
  name: 'normal',
  polynomial: hermitePolynomial,
  density: (draw) => inverseSquareRootOfTwoPi * exp(-0.5 * draw * draw),
};
