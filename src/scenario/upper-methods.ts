/** The ways to the martingale bound of the bracket, the usual one first. */
export const upperMethods = ['one-step', 'andersen-broadie', 'regressed'] as const;

export type UpperMethod = (typeof upperMethods)[number];
