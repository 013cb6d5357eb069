import {
  Composer,
  type CST,
  isAlias,
  isMap,
  isScalar,
  isSeq,
  type Node,
  type ParsedNode,
  type Scalar,
  type YAMLMap,
} from 'yaml';
import { quoted } from '../messages/printable.js';
import type { Findings } from './findings.js';
import { splitWithinLimits } from './guard.js';
import type { SourceText, TextSpan } from './source-text.js';
import type { Entry, MapNode, ScalarNode, TreeNode } from './tree.js';
import { tellComplaints } from './yaml-complaints.js';

/**
 * Reads a text as YAML 1.2 into groups, lists and values with their places.
 *
 * Everything that YAML offers beyond that (several documents, anchors and aliases, tags, directives, keys that are no
 * text, a key twice) is a mistake: each is a way for a file to mean something else than it seems to say.
 *
 * @fails adds every mistake that it finds and gives null
 */
export function readTree(source: SourceText, findings: Findings): MapNode | null {
  const tokens = splitWithinLimits(source.text, findings);
  if (tokens === null) return null;
  for (const token of tokens) if (token.type === 'directive') directive(token, findings);
  const documents = compose(tokens, source.text.length);
  const [first, second] = documents;
  tellComplaints(
    documents.flatMap(({ errors }) => errors),
    tokens,
    source,
    findings,
  );
  if (second !== undefined) severalDocuments(second.range[0], findings);
  const walk = new Walk(source, findings);
  const root = first!.contents === null ? null : walk.read(first!.contents as ParsedNode, { start: 0, end: 0 });
  if (findings.count > 0) return null;
  if (root === null || (root.kind === 'scalar' && root.value === null)) return empty(findings);
  if (root.kind === 'map') return root;
  findings.add({
    code: 'wrong-type',
    at: root.span,
    what: `A scenario is a group of keys, but ${root.kind === 'list' ? 'a list' : 'a single value'} stands here.`,
    why: 'Everything in a scenario is found by its key.',
    mend: 'Begin with keys such as `constants:`, `drivers:` and `contract:`.',
  });
  return null;
}

function compose(tokens: CST.Token[], length: number) {
  // The reader makes an Error with a stack trace for each complaint; traces would cost seconds on a hostile text.
  const { stackTraceLimit } = Error;
  Error.stackTraceLimit = 0;
  try {
    const composer = new Composer({
      version: '1.2',
      schema: 'core',
      uniqueKeys: false,
      prettyErrors: false,
      logLevel: 'silent',
    });
    return [...composer.compose(tokens, true, length)];
  } finally {
    Error.stackTraceLimit = stackTraceLimit;
  }
}

/** Turns the reader's nodes into ours; the depth was limited before, so recursion is safe. */
class Walk {
  constructor(
    private readonly source: SourceText,
    private readonly findings: Findings,
  ) {}

  /** @param emptySpan where to point if nothing stands at the place of the value */
  read(node: ParsedNode | null, emptySpan: TextSpan): TreeNode {
    if (node === null) return { kind: 'scalar', span: emptySpan, value: null, text: '', textStart: null };
    const span = { start: node.range[0], end: node.range[1] };
    this.refuseExtras(node, span);
    if (isMap(node)) return { kind: 'map', span, entries: this.entries(node as YAMLMap.Parsed) };
    if (isSeq(node))
      return { kind: 'list', span, items: node.items.map((item) => this.read(item as ParsedNode, span)) };
    if (isScalar(node)) return this.scalar(node as Scalar.Parsed, span, emptySpan);
    return { kind: 'scalar', span, value: null, text: '', textStart: null };
  }

  private entries(map: YAMLMap.Parsed): ReadonlyMap<string, Entry> {
    const entries = new Map<string, Entry>();
    for (const pair of map.items) {
      const key = pair.key as ParsedNode | null;
      const keySpan =
        key === null ? { start: map.range[0], end: map.range[0] } : { start: key.range[0], end: key.range[1] };
      const value = this.read(pair.value as ParsedNode | null, keySpan);
      if (key !== null) this.refuseExtras(key, keySpan);
      if (!isScalar(key) || typeof key.value !== 'string') keyNotText(keySpan, this.findings);
      else if (key.value === '__proto__') keyReserved(keySpan, this.findings);
      else {
        const earlier = entries.get(key.value);
        if (earlier === undefined) entries.set(key.value, { key: key.value, keySpan, value });
        else duplicateKey(key.value, keySpan, this.source.lineOf(earlier.keySpan.start), this.findings);
      }
    }
    return entries;
  }

  private scalar(node: Scalar.Parsed, span: TextSpan, emptySpan: TextSpan): ScalarNode {
    const value = node.value as ScalarNode['value'];
    if (node.type === 'PLAIN') {
      const text = node.source;
      const standsThere = this.source.text.startsWith(text, span.start);
      return {
        kind: 'scalar',
        span: text === '' ? emptySpan : span,
        value,
        text,
        textStart: standsThere ? span.start : null,
      };
    }
    const text = String(value);
    const isQuoted = node.type === 'QUOTE_DOUBLE' || node.type === 'QUOTE_SINGLE';
    const isExact = isQuoted && this.source.text.slice(span.start + 1, span.end - 1) === text;
    return { kind: 'scalar', span, value, text, textStart: isExact ? span.start + 1 : null };
  }

  private refuseExtras(node: Node, at: TextSpan): void {
    if (isAlias(node) || ('anchor' in node && node.anchor !== undefined)) {
      this.findings.add({
        code: 'yaml-alias',
        at,
        what: isAlias(node) ? 'An alias stands here.' : 'This value carries an anchor.',
        why: 'With them a short text can stand for a very long one, and a value is not where a reader looks for it.',
        mend: 'Write the value out, or state it once under `constants` and use its name.',
      });
    } else if (node.tag !== undefined) {
      this.findings.add({
        code: 'yaml-tag',
        at,
        what: `This value carries the tag ${quoted(node.tag)}.`,
        why: 'What a value is follows from its key alone.',
        mend: 'Take the tag away.',
      });
    }
  }
}

function directive(token: CST.Token, findings: Findings): void {
  findings.add({
    code: 'yaml-directive',
    at: { start: token.offset, end: token.offset + ('source' in token ? token.source.length : 1) },
    what: 'A line that begins with % is a directive to the YAML reader.',
    why: 'Directives can change what the rest of the text means.',
    mend: 'Take the line away; scenarios are always read as YAML 1.2.',
  });
}

function severalDocuments(offset: number, findings: Findings): void {
  findings.add({
    code: 'several-documents',
    at: { start: offset, end: offset + 3 },
    what: 'A second document begins here.',
    why: 'One file states one contract; a second document would be passed over.',
    mend: 'Take the line `---` away, or put the second document into its own file.',
  });
}

function empty(findings: Findings): null {
  findings.add({
    code: 'scenario-empty',
    at: null,
    what: 'The scenario is empty, or holds comments only.',
    why: 'There is nothing to value.',
    mend: 'State `constants`, `drivers` and `contract`.',
  });
  return null;
}

function keyNotText(at: TextSpan, findings: Findings): void {
  findings.add({
    code: 'key-not-text',
    at,
    what: 'This key is not a plain text.',
    why: 'Keys and names are words; numbers, true, null, lists and groups are not.',
    mend: 'Write a word as the key.',
  });
}

function keyReserved(at: TextSpan, findings: Findings): void {
  findings.add({
    code: 'reserved-name',
    at,
    what: '`__proto__` cannot be a key.',
    why: 'It has a meaning of its own in the language that this program is written in.',
    mend: 'Choose another name.',
  });
}

function duplicateKey(key: string, at: TextSpan, line: number, findings: Findings): void {
  findings.add({
    code: 'duplicate-key',
    at,
    what: `The key ${quoted(key)} stands in this group already, on line ${line}.`,
    why: 'Only one of the two could hold, and a reader may look at the other.',
    mend: 'Take one of them away.',
    evidence: { key, line },
  });
}
