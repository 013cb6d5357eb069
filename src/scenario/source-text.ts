import type { Place } from '../messages/message.js';

/** A stretch of the text in UTF-16 units, `end` exclusive. */
export interface TextSpan {
  readonly start: number;
  readonly end: number;
}

const longestLine = 10_000;

/** A text with its name, which finds line and column of any offset. */
export class SourceText {
  private readonly lineStarts: number[] = [0];

  constructor(
    readonly file: string,
    readonly text: string,
  ) {
    for (let end = text.indexOf('\n'); end >= 0; end = text.indexOf('\n', end + 1)) this.lineStarts.push(end + 1);
  }

  /** 1-based line of an offset. @cost logarithmic in the number of lines */
  lineOf(offset: number): number {
    let low = 0;
    let high = this.lineStarts.length - 1;
    while (low < high) {
      const middle = (low + high + 1) >> 1;
      if (this.lineStarts[middle]! <= offset) low = middle;
      else high = middle - 1;
    }
    return low + 1;
  }

  /** 1-based column of an offset, in UTF-16 units as editors count them. */
  columnOf(offset: number): number {
    return offset - this.lineStarts[this.lineOf(offset) - 1]! + 1;
  }

  /** The place of a span; what runs over the line end is cut off, what is empty is one character long. */
  placeOf({ start, end }: TextSpan): Place {
    const line = this.lineOf(start);
    const lineEnd = this.lineStarts[line - 1]! + this.lineText(line).length;
    const length = Math.max(1, Math.min(end, lineEnd) - start);
    return { file: this.file, line, column: this.columnOf(start), length };
  }

  /** A line without its end; null for lines too long to be shown to anybody. */
  shownLine(line: number): string | null {
    const text = this.lineText(line);
    return text.length > longestLine ? null : text;
  }

  private lineText(line: number): string {
    const start = this.lineStarts[line - 1]!;
    const next = this.lineStarts[line];
    const whole = next === undefined ? this.text.slice(start) : this.text.slice(start, next - 1);
    return whole.endsWith('\r') ? whole.slice(0, -1) : whole;
  }
}
