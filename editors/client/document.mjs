// A document as a client keeps it: text, version, and positions in the units that
// were agreed on ('utf-8', 'utf-16' or 'utf-32').

export class Document {
  constructor(uri, text, encoding = 'utf-16') {
    Object.assign(this, { uri, text, encoding, version: 1 });
  }

  get lines() {
    return this.text.split(/\r\n|\n|\r/);
  }

  /** The length of a string in the agreed units. */
  measure(string) {
    if (this.encoding === 'utf-8') return Buffer.byteLength(string);
    return this.encoding === 'utf-16' ? string.length : [...string].length;
  }

  /** The position of a string index. */
  position(index) {
    const before = this.text.slice(0, index).split(/\r\n|\n|\r/);
    return { line: before.length - 1, character: this.measure(before.at(-1)) };
  }

  /** Where a text stands, the nth time, shifted by a number of characters. */
  find(needle, shift = 0, from = 0) {
    const index = this.text.indexOf(needle, from);
    if (index < 0) throw new Error(`the note has no '${needle}'`);
    return this.position(index + shift);
  }

  whole() {
    return { start: { line: 0, character: 0 }, end: this.position(this.text.length) };
  }

  /** The string index of a position; NaN where there is none. */
  index({ line, character }) {
    const starts = [0];
    for (const match of this.text.matchAll(/\r\n|\n|\r/g)) starts.push(match.index + match[0].length);
    if (line < 0 || line >= starts.length) return NaN;
    let units = 0, at = starts[line];
    for (const point of this.lines[line]) {
      if (units >= character) break;
      units += this.measure(point);
      at += point.length;
    }
    return units === character ? at : NaN;
  }

  /** Replaces a range; gives the change as the protocol tells it. */
  change(range, text) {
    const [from, to] = [this.index(range.start), this.index(range.end)];
    this.text = this.text.slice(0, from) + text + this.text.slice(to);
    this.version++;
    return { range, text };
  }

  /** The text after edits that all refer to the present one. */
  edited(edits) {
    const sorted = [...edits].sort((a, b) => this.index(b.range.start) - this.index(a.range.start));
    let text = this.text;
    for (const edit of sorted) {
      text = text.slice(0, this.index(edit.range.start)) + edit.newText + text.slice(this.index(edit.range.end));
    }
    return text;
  }

  /** A column of a position in code points from 1, as review prints it. */
  column({ line, character }) {
    const index = this.index({ line, character });
    const start = this.index({ line, character: 0 });
    return [...this.text.slice(start, index)].length + 1;
  }
}
