/** A place in a text; both count from 1. Columns count UTF-16 units, as editors do; a byte order mark counts nothing. */
export interface TextPlace {
  readonly line: number;
  readonly column: number;
}

/** Line and column of indices in one text. LF, CR LF and CR each end a line. */
export class TextPlaces {
  private readonly lineStarts: number[];

  constructor(text: string) {
    this.lineStarts = [text.charCodeAt(0) === 0xfeff ? 1 : 0];
    for (let i = 0; i < text.length; i++) {
      const c = text.charCodeAt(i);
      if (c === 10 || (c === 13 && text.charCodeAt(i + 1) !== 10)) this.lineStarts.push(i + 1);
    }
  }

  at(index: number): TextPlace {
    let low = 0;
    let high = this.lineStarts.length - 1;
    while (low < high) {
      const middle = (low + high + 1) >> 1;
      if ((this.lineStarts[middle] as number) <= index) low = middle;
      else high = middle - 1;
    }
    return { line: low + 1, column: Math.max(1, index - (this.lineStarts[low] as number) + 1) };
  }
}
