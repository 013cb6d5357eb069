import { mkdtemp, readdir, readFile, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { readPlan, readRecord } from '#built/store/read-record.js';
import { prepareRunDirectory, recordText, writeRecord } from '#built/store/record-file.js';
import { sampleRecord } from '../report/sample-record.js';

let folder = '';
beforeEach(async () => {
  folder = await mkdtemp(join(tmpdir(), 'tarry-store-'));
});
afterEach(() => rm(folder, { recursive: true, force: true }));

const endedAt = new Date(Date.UTC(2027, 2, 1));

async function planFrom(content: unknown) {
  const path = join(folder, 'given.json');
  await writeFile(path, typeof content === 'string' ? content : JSON.stringify(content));
  return readPlan(path);
}

function codesAndWords(read: Awaited<ReturnType<typeof readPlan>>) {
  return read.kind === 'refused' ? read.messages.map(({ code, what }) => `${code}: ${what.replace(/^\S+ /, '')}`) : [];
}

describe('keeping a record', () => {
  it('makes the folder, leaves one whole file, and reads the same record back', async () => {
    const directory = join(folder, 'runs', 'of today');
    expect(await prepareRunDirectory(directory)).toEqual([]);
    const written = await writeRecord(directory, sampleRecord, endedAt);
    if (written.kind === 'refused') throw new Error(JSON.stringify(written.messages));
    expect(written.id).toMatch(/^20270301-000000000-[0-9a-f]{8}$/);
    expect(await readdir(directory)).toEqual([`${written.id}.json`]);
    expect(await readFile(written.path, 'utf8')).toBe(recordText(sampleRecord));
    expect(await readRecord(written.path)).toEqual({ kind: 'read', record: sampleRecord });
    expect(await readPlan(written.path)).toEqual({
      kind: 'read',
      plan: sampleRecord.plan,
      scenarioHash: sampleRecord.scenario.sha256,
    });
  });

  it('comes back at once where a folder refuses to be made', async () => {
    for (const directory of ['/proc/foo', '/proc/foo/bar', '/dev/null/runs', '']) {
      expect((await prepareRunDirectory(directory)).map(({ code }) => code)).toEqual(['run-directory-unwritable']);
    }
  });

  it('says so where nothing can be written', async () => {
    const file = join(folder, 'file');
    await writeFile(file, '');
    const refusals = [await prepareRunDirectory(join(file, 'runs')), await prepareRunDirectory(file)];
    for (const messages of refusals) expect(messages.map(({ code }) => code)).toEqual(['run-directory-unwritable']);
    const written = await writeRecord(join(file, 'runs'), sampleRecord, endedAt);
    expect(written.kind === 'refused' && written.messages[0]!.what).toContain('a part of its path is a file');
  });
});

describe('reading a plan', () => {
  it('passes over fields of other versions', async () => {
    const read = await planFrom({ schemaVersion: 1, plan: { ...sampleRecord.plan, later: 1 }, later: true });
    expect(read).toEqual({ kind: 'read', plan: sampleRecord.plan, scenarioHash: null });
  });

  it('names everything that is missing', async () => {
    const { innerPointCount: _, basisSize: __, round: ___, ...plan } = sampleRecord.plan;
    expect(codesAndWords(await planFrom({ title: 'no record' }))).toEqual([
      'record-invalid: is not a whole record: `schemaVersion` is missing.',
      'record-invalid: is not a whole record: `plan` is missing.',
    ]);
    expect(codesAndWords(await planFrom({ schemaVersion: 1, plan }))).toEqual([
      'record-invalid: is not a whole record: `plan.basisSize` is missing.',
      'record-invalid: is not a whole record: `plan.round` is missing.',
      'record-invalid: is not a whole record: `plan.innerPointCount` is missing.',
    ]);
  });

  it.each([
    ['basisSize', -1],
    ['basisSize', 0.5],
    ['basisSize', null],
    ['round', 0],
    ['round', 1.5],
    ['round', 'second'],
    ['fitPathCount', 0],
    ['fitPathCount', 1.5],
    ['outerPathCount', -1],
    ['outerPathCount', 1e12],
    ['innerPointCount', -1],
    ['innerPointCount', '16'],
    ['nestedInnerPathCount', -1],
    ['upper', 'sideways'],
    ['upper', null],
  ])('refuses %s of %s', async (field, value) => {
    const [message, ...others] = codesAndWords(
      await planFrom({ ...sampleRecord, plan: { ...sampleRecord.plan, [field]: value } }),
    );
    expect(others).toEqual([]);
    expect(message).not.toMatch(/expected|Invalid|Too /);
    expect(message).toMatch(new RegExp(`^record-invalid: is not a record: \`plan\\.${field}\` is wrong`));
  });

  it('takes nested counts of 0, but not for a nested bound', async () => {
    const plan = { ...sampleRecord.plan, nestedOuterPathCount: 0, nestedInnerPathCount: 0 };
    expect(await planFrom({ schemaVersion: 1, plan })).toEqual({ kind: 'read', plan, scenarioHash: null });
    expect(codesAndWords(await planFrom({ schemaVersion: 1, plan: { ...plan, upper: 'andersen-broadie' } }))).toEqual([
      'record-invalid: asks for the Andersen-Broadie upper bound but gives it no paths.',
    ]);
  });

  it.each([
    ['', 'is not JSON.'],
    ['title: a scenario', 'is not JSON.'],
    ['[1, 2]', 'is not a record: it holds no object.'],
    ['null', 'is not a record: it holds no object.'],
    ['{"schemaVersion": 2, "plan": {}}', '`schemaVersion` is wrong'],
    ['['.repeat(200_000), 'is not JSON.'],
  ])('refuses a file of %.20s', async (text, words) => {
    const found = codesAndWords(await planFrom(text));
    expect(found[0]).toContain('record-invalid: ');
    expect(found[0]).toContain(words);
  });

  it('says why a file cannot be read', async () => {
    const missing = await readPlan(join(folder, 'none.json'));
    expect(codesAndWords(missing)).toEqual(['file-unreadable: cannot be read: there is no such file or folder.']);
    const directory = await readPlan(folder);
    expect(codesAndWords(directory)[0]).toContain('it is a folder, not a file');
    expect(directory.kind === 'refused' && directory.messages[0]!.mend).toContain('Name one record');
  });
});

describe('reading a record', () => {
  it('holds it to what the reports need', async () => {
    const path = join(folder, 'part.json');
    const { lower: _, ...rest } = sampleRecord;
    await writeFile(path, JSON.stringify(rest));
    const read = await readRecord(path);
    expect(read.kind === 'refused' && read.messages.map(({ evidence }) => evidence.field)).toEqual(['lower']);
  });
});
