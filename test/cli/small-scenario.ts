/** An invented right on two fields with counts small enough for a second. */
export const smallScenario = `title: Right to sell the better of two fields
money: crowns
clock: years

constants:
  rate: 0.05
  upkeep: 0.10
  spread: 0.20

drivers:
  field:
    count: 2
    start: 100
    law: lognormal
    growth of mean: rate - upkeep
    volatility: spread

contract:
  decided by: holder
  decision dates: { count: 3, last: 3, today: no }
  payoff: max(0, largest(field) - 100)
  at expiry: lapse
  discount: rate

method:
  counts: { fit: 2000, outer: 512, inner: 8 }
`;
