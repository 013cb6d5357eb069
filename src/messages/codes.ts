import type { Severity } from './message.js';

/** What the catalogue knows about a code, whatever the place where it is raised. */
export interface CodeEntry {
  readonly severity: Severity;
  /** One line that fits every message with this code. */
  readonly title: string;
}

const catalogue = {
  // The text as a whole
  'scenario-too-large': { severity: 'mistake', title: 'The scenario is larger than any contract needs' },
  'scenario-too-deep': { severity: 'mistake', title: 'The scenario nests deeper than its language does' },
  'scenario-empty': { severity: 'mistake', title: 'The scenario holds nothing' },
  'not-yaml': { severity: 'mistake', title: 'The text is not YAML' },
  'several-documents': { severity: 'mistake', title: 'A scenario is one document' },
  'yaml-alias': { severity: 'mistake', title: 'Anchors and aliases are not part of the language' },
  'yaml-tag': { severity: 'mistake', title: 'Tags are not part of the language' },
  'yaml-directive': { severity: 'mistake', title: 'Directives are not part of the language' },
  'duplicate-key': { severity: 'mistake', title: 'A key stands twice in one group' },
  'key-not-text': { severity: 'mistake', title: 'A key is a plain word' },
  'object-not-plain': { severity: 'mistake', title: 'A scenario object is plain data' },
  'too-many-mistakes': { severity: 'mistake', title: 'The list of mistakes was cut' },

  // Keys and kinds of value
  'unknown-key': { severity: 'mistake', title: 'A key that the language does not have here' },
  'missing-key': { severity: 'mistake', title: 'A key that cannot be left out' },
  'wrong-type': { severity: 'mistake', title: 'A value of another kind is wanted' },
  'wrong-choice': { severity: 'mistake', title: 'A value that is not among the choices' },
  'not-built-yet': { severity: 'mistake', title: 'Understood, but not built yet' },

  // Names
  'bad-name': { severity: 'mistake', title: 'A name that expressions could not use' },
  'reserved-name': { severity: 'mistake', title: 'A name that the language keeps for itself' },
  'name-used-twice': { severity: 'mistake', title: 'One name for two things' },
  'unknown-name': { severity: 'mistake', title: 'A name that the scenario does not state' },
  'unknown-function': { severity: 'mistake', title: 'A function that the language does not have' },
  'name-not-usable-here': { severity: 'mistake', title: 'A name whose value is not known in this place' },
  'unobserved-driver': { severity: 'mistake', title: 'A rule cannot use what nobody sees' },

  // Expressions
  'expression-syntax': { severity: 'mistake', title: 'The expression cannot be read' },
  'expression-too-long': { severity: 'mistake', title: 'The expression is longer than the limit' },
  'expression-too-deep': { severity: 'mistake', title: 'The expression nests deeper than the limit' },
  'wrong-argument-count': { severity: 'mistake', title: 'A function with too few or too many arguments' },
  'bare-family': { severity: 'mistake', title: 'A family stands where one number is meant' },
  'not-a-family': { severity: 'mistake', title: 'A family is wanted and something else is given' },
  'index-not-constant': { severity: 'mistake', title: 'A position in a family that is not known beforehand' },
  'index-out-of-range': { severity: 'mistake', title: 'A position that the family does not have' },
  'condition-expected': { severity: 'mistake', title: 'A number stands where a condition is meant' },
  'number-expected': { severity: 'mistake', title: 'A condition stands where a number is meant' },
  'chained-comparison': { severity: 'mistake', title: 'Comparisons do not chain' },

  // Values
  'not-finite-value': { severity: 'mistake', title: 'A value that is not a finite number' },
  'value-out-of-range': { severity: 'mistake', title: 'A value outside the range that has a meaning' },
  'too-many-constants': { severity: 'mistake', title: 'More constants than the program takes' },
  'constant-cycle': { severity: 'mistake', title: 'Constants that are stated through one another' },
  'bad-date': { severity: 'mistake', title: 'A day that is not in the calendar' },

  // Drivers and correlation
  'unknown-law': { severity: 'mistake', title: 'A law that does not exist' },
  'key-of-another-law': { severity: 'mistake', title: 'A key that belongs to another law' },
  'start-count': { severity: 'mistake', title: 'As many starting values as members are wanted' },
  'too-many-drivers': { severity: 'mistake', title: 'More drivers than the program takes' },
  'correlation-stated-twice': { severity: 'mistake', title: 'One pair, two correlations' },
  'correlation-with-itself': { severity: 'mistake', title: 'A correlation needs two different drivers' },
  'matrix-shape': { severity: 'mistake', title: 'A correlation matrix has one row and one column for each driver' },
  'matrix-not-symmetric': { severity: 'mistake', title: 'A correlation matrix is symmetric' },
  'matrix-diagonal': { severity: 'mistake', title: 'A driver correlates with itself at 1' },
  'correlation-impossible': { severity: 'mistake', title: 'No drivers can have these correlations together' },

  // Contract and method
  'mixed-forms': { severity: 'mistake', title: 'Keys of two different forms together' },
  'dates-not-rising': { severity: 'mistake', title: 'Decision dates rise' },
  'date-before-today': { severity: 'mistake', title: 'Nothing can be decided before today' },
  'no-date-after-today': { severity: 'mistake', title: 'At least one decision date lies after today' },
  'too-many-dates': { severity: 'mistake', title: 'More decision dates than the program takes' },
  'dates-do-not-divide': { severity: 'mistake', title: 'The last date is not reached in whole steps' },
  'today-contradicted': { severity: 'mistake', title: 'Today is a decision date and is not' },
  'width-and-counts': { severity: 'mistake', title: 'A wanted width and fixed counts contradict each other' },
  'count-without-use': { severity: 'mistake', title: 'A count that nothing uses' },
  'bad-override': { severity: 'mistake', title: 'An override that cannot be followed' },

  // Raised by the numerical stages: mistakes
  'not-finite': { severity: 'mistake', title: 'A path left the finite numbers' },
  'memory-beyond-machine': { severity: 'mistake', title: 'The run needs more memory than the machine has' },
  'fit-memory-too-small': { severity: 'mistake', title: 'The paths of the fit need more memory than they may take' },
  'fewer-paths-than-columns': { severity: 'mistake', title: 'A regression needs more paths than columns' },
  'plan-does-not-fit': { severity: 'mistake', title: 'The replayed record holds no plan for this scenario' },
  defect: { severity: 'mistake', title: 'A defect of this program' },

  // Raised by the numerical stages: advice
  'thin-fit': { severity: 'advice', title: 'Few fit paths for the number of columns' },
  'rank-loss': { severity: 'advice', title: 'Columns were dropped because they repeat others' },
  'wide-gap': { severity: 'advice', title: 'The bounds lie far apart' },
  'crossed-bounds': { severity: 'advice', title: 'The lower bound lies above the upper beyond noise' },
  'effort-too-small': { severity: 'advice', title: 'Too few paths for the error bars to be trusted' },
  'width-missed': { severity: 'advice', title: 'The wanted width was not reached' },

  // Files and the command line
  'file-unreadable': { severity: 'mistake', title: 'A file cannot be read' },
  'file-too-large': { severity: 'mistake', title: 'A file is larger than its purpose needs' },
  'file-not-text': { severity: 'mistake', title: 'A file is not UTF-8 text' },
  'record-invalid': { severity: 'mistake', title: 'A file is not a record of this program' },
  'run-directory-unwritable': { severity: 'mistake', title: 'A run cannot be stored' },
  'command-line': { severity: 'mistake', title: 'The command was called wrongly' },
} as const satisfies Readonly<Record<string, CodeEntry>>;

type Catalogue = typeof catalogue;

/** Every code that a message may carry; a code never changes its meaning. */
export type MessageCode = keyof Catalogue;

/** The codes that stop the work. */
export type MistakeCode = { [C in MessageCode]: Catalogue[C]['severity'] extends 'mistake' ? C : never }[MessageCode];

/** The codes that travel with a delivered result. */
export type AdviceCode = Exclude<MessageCode, MistakeCode>;

/** The catalogue as a map, so that no text from outside is ever looked up on an object. */
export const messageCodes: ReadonlyMap<string, CodeEntry> = new Map(Object.entries(catalogue));
