/** What the command says to the program that started it. */
export const exitCodes = {
  done: 0,
  /** A mistake in the scenario or in data. */
  refused: 1,
  /** A mistake on the command line. */
  usage: 2,
  /** Ended early on request; what was finished is delivered. */
  stopped: 3,
  /** A defect of ours. */
  defect: 4,
  /** Finished, but advice was raised and `--strict` was given. */
  doubted: 5,
  /** Ended at once by a second Ctrl-C. */
  interrupted: 130,
} as const;
