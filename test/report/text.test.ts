import { describe, expect, it } from 'vitest';
import { CAUTION, textReport } from '#built/report/text.js';
import type { RunRecord } from '#built/result/record.js';
import { issuerRecord, sampleAdvice, sampleRecord } from './sample-record.js';

/** The cells of the row that starts with a name. */
function row(text: string, name: string): string[] {
  const line = text.split('\n').find((candidate) => candidate.trim().startsWith(`${name}  `));
  return (line ?? '').trim().split(/ {2,}/);
}

const oneLine = (text: string) => text.replaceAll(/\s+/g, ' ');

describe('the text of a run', () => {
  const text = textReport(sampleRecord);

  it('answers in its second line, rounded outward', () => {
    const [title, answer] = text.split('\n');
    expect(title).toBe('Right to fell one of three groves');
    expect(answer).toBe('Value to the holder: between 16.1502 and 16.1690 crowns (95% bracket, 0.12% wide).');
  });

  it('shows each estimate to two digits of its half-width, with paths and method', () => {
    expect(row(text, 'lower bound')).toEqual([
      'lower bound',
      '16.1543',
      '0.0041',
      '61,440',
      'fitted rule, one exercise per path',
    ]);
    expect(row(text, 'upper bound')).toEqual(['upper bound', '16.1668', '0.0022', '61,440', 'one-step martingale']);
    const beside = 'upper bound (beside the bracket)';
    expect(row(text, beside).slice(0, 4)).toEqual([beside, '16.171', '0.012', '1,024']);
    expect(row(text, 'gap').slice(0, 3)).toEqual(['gap', '0.0125', '0.0012']);
  });

  it('condenses thirty dates and still accounts for every path', () => {
    const shares = text
      .split('\n')
      .flatMap((line) => /^ {2}(?:[\d.]+ to [\d.]+|never) +([\d.]+)%/.exec(line)?.[1] ?? []);
    expect(shares.length).toBeLessThanOrEqual(13);
    expect(shares.reduce((sum, share) => sum + Number(share), 0)).toBeCloseTo(100, 6);
    expect(text).toContain('date (years)');
    expect(text).toContain('5% have done so by 0.3, half by 2.6 and 95% by 3.');
  });

  it('says the plan, the pilot, the basis, the passed checks, the time and the caution', () => {
    const words = oneLine(text);
    expect(words).toContain(
      '40,000 paths fit the rule. 61,440 fresh paths carry the bounds, with 16 points of one step',
    );
    expect(words).toContain('expected a bracket 0.024 crowns wide where 0.026 was wanted; it became 0.019.');
    expect(words).toContain('Kept: 9 to 10, by date. The columns explain 40.0% to 90.4% of the variance');
    for (const check of sampleRecord.passedChecks) expect(text).toContain(`✓ ${check}`);
    expect(text).toContain('12.3 s in all: fit 3.2 s, pilot 1.1 s, bounds 7.9 s.');
    expect(words).toContain(CAUTION);
    expect(text).toMatch(/\nAdvice\n {2}None\.\n/);
  });

  it('tells how to get the same digits', () => {
    expect(text).toContain("  tarry value orchard.yaml --seed 'barn door' --with spread=0.25 --plan RECORD\n");
    const origin = { kind: 'command line' } as const;
    const formula = {
      ...sampleRecord,
      settings: [{ name: 'constants.spread', value: 'if(1 >= 0, 2 * 0.1, 0) = 0.2', origin }],
    };
    expect(textReport(formula)).toContain(" --with 'spread=if(1 >= 0, 2 * 0.1, 0)' --plan");
    expect(textReport(sampleRecord, { recordPath: 'my runs/a.json' })).toContain("--plan 'my runs/a.json'\n");
    const piped = { ...sampleRecord, scenario: { ...sampleRecord.scenario, path: 'standard input' } };
    expect(textReport(piped)).toContain("  tarry value - --seed 'barn door'");
  });

  it('names what was changed outside the file', () => {
    expect(text.split('\n')[2]).toBe('Changed on the command line: constants.spread = 0.25.');
    expect(textReport({ ...sampleRecord, settings: [] })).not.toContain('Changed on the command line');
  });

  it('keeps to the width it is given', () => {
    for (const line of textReport(sampleRecord, { width: 70 }).split('\n')) {
      const isTableOrCommand = /─|\d {3}|made by|upper bound less|tarry value/.test(line);
      if (!isTableOrCommand && line !== text.split('\n')[1]) expect(line.length).toBeLessThanOrEqual(70);
    }
  });
});

describe('a narrow terminal', () => {
  it('wraps every sentence, and the command not at all', () => {
    const text = textReport({ ...sampleRecord, advice: [sampleAdvice] }, { width: 40 });
    for (const line of text.split('\n')) {
      const isTableOrCommand = /─|\d {3}|made by|bound {2,}|upper bound less|tarry value|share of|▪|never {2,}|\^/.test(
        line,
      );
      if (!isTableOrCommand) expect(line.length, line).toBeLessThanOrEqual(40);
    }
    expect(text).toContain('  tarry value orchard.yaml');
  });
});

describe('the gap', () => {
  it('says between which estimates it lies', () => {
    expect(row(textReport(sampleRecord), 'gap')[3]).toBe('upper bound less lower bound');
  });
});

describe('who decides', () => {
  const text = oneLine(textReport(issuerRecord));

  it('gives an issuer the rule as the upper and martingales as the lower bounds', () => {
    expect(row(textReport(issuerRecord), 'upper bound')[4]).toBe('fitted rule, one exercise per path');
    expect(row(textReport(issuerRecord), 'lower bound')[4]).toBe('one-step martingale');
    expect(row(textReport(issuerRecord), 'lower bound (beside the bracket)')[1]).toBe('16.130');
    expect(text).toContain('Value to the holder: between');
    expect(text).toContain(
      'The issuer decides and wants to pay as little as it can. The upper bound is what the holder receives',
    );
    expect(text).toContain("The bracket's lower end comes from");
  });

  it('never says to an issuer that a rule earns', () => {
    expect(text).not.toContain('earn');
  });
});

describe('how the basis was chosen', () => {
  const { selection } = sampleRecord;

  it('shows every size that was tried, which was kept, and why no larger one was tried', () => {
    const text = textReport(sampleRecord);
    expect(row(text, '7')).toEqual(['7', '32,768', '0.021', '0.030']);
    expect(row(text, '10')).toEqual(['10', '40,000', '0.012', '0.022', 'kept']);
    expect(oneLine(text)).toContain(
      'the kept one on 1,024. Paths are those of the fit; the width is that of the bracket',
    );
  });

  it.each([
    ['width in reach', 'the wanted width is in reach, for no more work than the next fit would take.'],
    ['no gain', 'the last ones brought nothing worth their work.'],
    ['no larger size', 'There is no larger size for this scenario.'],
    ['larger size too costly', 'it would cost more than the run may take.'],
    ['too few paths', 'the paths of the fit that the scenario fixes are too few for it.'],
    ['too little memory', 'it does not fit into the memory.'],
  ] as const)('says in words: %s', (ended, words) => {
    expect(oneLine(textReport({ ...sampleRecord, selection: { ...selection!, ended } }))).toContain(words);
  });

  it('says nothing where there was no choice', () => {
    expect(textReport({ ...sampleRecord, selection: null })).not.toContain('Choice of the basis');
  });
});

describe('rounds', () => {
  const [first] = sampleRecord.rounds;
  const second = { ...first!, round: 2, outerPathCount: 90000, errorProbability: 0.025, standardErrors: 2.2414 };
  const third = { ...second, round: 3, errorProbability: 0.0125, standardErrors: 2.4977, high: 16.16 };
  const ofRound = (round: number, rounds: RunRecord['rounds']) =>
    textReport({ ...sampleRecord, plan: { ...sampleRecord.plan, round }, rounds });

  it('one alone needs no table', () => {
    expect(textReport(sampleRecord)).not.toContain('Rounds');
  });

  it('more than one are shown with width, standard errors and error probability, and their sum', () => {
    const text = ofRound(3, [first!, second, third]);
    expect(row(text, '1')).toEqual(['1', '61,440', '16', '0.0187', '1.96', '5%']);
    expect(row(text, '2')).toEqual(['2', '90,000', '16', '0.0187', '2.24', '2.5%']);
    expect(row(text, '3')).toEqual(['3', '90,000', '16', '0.0098', '2.50', '1.25%']);
    expect(oneLine(text)).toContain('all of them together with 8.75%.');
  });

  it('the bracket of a further round says its standard errors, that of a replay of it too', () => {
    const words = 'crowns (bracket of round 2, 2.24 standard errors beyond each bound, 0.12% wide).';
    expect(oneLine(ofRound(2, [first!, second]))).toContain(words);
    expect(oneLine(ofRound(2, [second]))).toContain(words);
    expect(ofRound(2, [second])).not.toContain('Rounds');
  });
});

describe('doubt', () => {
  it('renders advice with its number and its remedy', () => {
    const text = textReport({ ...sampleRecord, advice: [sampleAdvice] });
    expect(text).toContain('Advice (1)\n');
    for (const part of ['wide-gap', 'The gap is 2.1% of the value.', 'orchard.yaml:17:3', 'Write a richer list']) {
      expect(text).toContain(part);
    }
  });

  it('shows a crossing as it was estimated', () => {
    const text = textReport({ ...sampleRecord, bracket95: { low: 16.2, high: 16.1 } });
    expect(oneLine(text)).toContain(
      'No bracket: its low end, 16.2000 crowns, is above its high end, 16.1000. The bounds cross; see the advice.',
    );
  });

  it('says that estimates cross within their error, and only then', () => {
    const crossed: RunRecord = { ...sampleRecord, upper: { ...sampleRecord.upper, value: 16.154 } };
    const words = 'the estimates cross within their error, and the bracket is valid.';
    expect(oneLine(textReport(crossed))).toContain(words);
    expect(oneLine(textReport(sampleRecord))).not.toContain(words);
    const doubted = { ...crossed, advice: [{ ...sampleAdvice, code: 'crossed-bounds' }] };
    expect(oneLine(textReport(doubted))).not.toContain(words);
  });

  it('says that a run was stopped', () => {
    expect(textReport({ ...sampleRecord, status: 'stopped' }).split('\n')[2]).toMatch(/^Stopped early:/);
  });

  it('calls an error that is not known unknown', () => {
    const unknown = { ...sampleRecord.upper, standardError: null, halfWidth95: null };
    expect(row(textReport({ ...sampleRecord, upper: unknown }), 'upper bound').slice(1, 3)).toEqual([
      '16.166789',
      'unknown',
    ]);
  });
});

describe('a contract that an event may end', () => {
  const record: RunRecord = {
    ...sampleRecord,
    dates: sampleRecord.dates.map((date, index) => ({ ...date, endedShare: index === 3 ? 0.07 : 0 })),
    neverExercisedShare: 0.33,
    endedByEventShare: 0.07,
  };
  const text = textReport(record);

  it('has a column and a sentence for the paths that it ends, and accounts for every path', () => {
    expect(text).toMatch(/share of paths +so far +ended/);
    const shares = text
      .split('\n')
      .flatMap((line) => {
        const dated = /^ {2}[\d.]+ to [\d.]+ +([\d.]+)% +[\d.]+% +([\d.]+)%/.exec(line)?.slice(1);
        return dated ?? /^ {2}never +([\d.]+)%/.exec(line)?.slice(1) ?? [];
      })
      .map(Number);
    expect(shares.reduce((sum, share) => sum + share, 0)).toBeCloseTo(100, 6);
    expect(oneLine(text)).toContain(
      'On 7.0% of the paths the ending event ends the contract before the right is used.',
    );
  });

  it('says nothing of it where no event can end the contract, or the record is from before', () => {
    const { endedByEventShare, ...older } = record;
    expect(endedByEventShare).toBe(0.07);
    for (const other of [sampleRecord, older as RunRecord]) expect(textReport(other)).not.toMatch(/ended|ending event/);
  });
});

describe('odd records', () => {
  it('takes a right that is never used, one date, no pilot and no nested bound', () => {
    const record: RunRecord = {
      ...sampleRecord,
      pilot: null,
      plan: { ...sampleRecord.plan, nestedOuterPathCount: 0, nestedInnerPathCount: 0 },
      uppers: [sampleRecord.upper],
      dates: [{ ...sampleRecord.dates[29]!, time: 1, exerciseShare: 0 }],
      neverExercisedShare: 1,
      exerciseTimeQuantiles: null,
      passedChecks: [],
    };
    const text = textReport(record);
    expect(row(text, 'never')[1]).toBe('100.0%');
    expect(oneLine(text)).toContain('There was no pilot: the outer and inner counts were given.');
    for (const word of [
      'Andersen',
      'beside the bracket',
      'Of the paths',
      'Checks passed',
      'Kept',
      'NaN',
      'undefined',
      'Infinity',
    ]) {
      expect(text).not.toContain(word);
    }
  });

  it('shows an exact value as one number, even where rounding crosses the bounds', () => {
    const sure = { standardError: 1e-17, halfWidth95: 2e-17 };
    for (const [low, high] of [
      [0.9512294245005, 0.9512294245007],
      [0.9512294245007, 0.9512294245005],
    ] as const) {
      const record: RunRecord = {
        ...sampleRecord,
        lower: { ...sampleRecord.lower, ...sure, value: low },
        upper: { ...sampleRecord.upper, ...sure, value: high },
        gap: { ...sure, value: high - low },
        bracket95: { low, high },
        pilot: { ...sampleRecord.pilot!, expectedWidth: 1e-17 },
      };
      const text = textReport(record);
      expect(oneLine(text)).toContain('Value to the holder: 0.9512294245 crowns. Both bounds give it on every path');
      expect(row(text, 'lower bound').slice(1, 3)).toEqual(['0.9512294245', '0']);
      expect(row(text, 'gap').slice(1, 3)).toEqual(['0', '0']);
      expect(oneLine(text)).toContain('found no sampling error');
      expect(text).not.toMatch(/0\.0{6}|No bracket|cross within/);
    }
  });

  it('takes a value of nothing', () => {
    const zero = { value: 0, standardError: 0, halfWidth95: 0 };
    const record: RunRecord = {
      ...sampleRecord,
      lower: { ...sampleRecord.lower, ...zero },
      upper: { ...sampleRecord.upper, ...zero },
      uppers: [],
      gap: zero,
      bracket95: { low: 0, high: 0 },
    };
    expect(textReport(record).split('\n')[1]).toBe(
      'Value to the holder: 0 crowns. Both bounds give it on every path: it has no sampling error.',
    );
  });

  it('lets no text of a scenario steer the terminal', () => {
    const hostile = '\u001b[2J\u001b]0;gone\u0007';
    const text = textReport({
      ...sampleRecord,
      scenario: { ...sampleRecord.scenario, title: hostile, money: hostile, path: hostile },
      seed: hostile,
      settings: [{ name: 'clock', value: hostile, origin: { kind: 'command line' } }],
      passedChecks: [hostile],
    });
    // biome-ignore lint/suspicious/noControlCharactersInRegex: these are the characters looked for
    expect(text).not.toMatch(/[\u0007\u001b]/);
  });

  it('colours only through the style it is given, and keeps columns in line', () => {
    const styled = textReport(sampleRecord, {
      style: (role, text) => (role === 'strong' ? `\u001b[1m${text}\u001b[22m` : text),
    });
    expect(styled.replaceAll('\u001b[1m', '').replaceAll('\u001b[22m', '')).toBe(textReport(sampleRecord));
    expect(styled).toContain('\u001b[1m16.1502 and 16.1690 crowns\u001b[22m');
  });
});
