/** Tells the line of ever later places of a text; each line end is looked for once. */
export class LineCount {
  private line = 1;
  private feed: number;

  constructor(private readonly text: string) {
    this.feed = text.indexOf('\n');
  }

  /** The line, from 1, of a place that is not before the last one asked for. */
  at(place: number): number {
    while (this.feed >= 0 && this.feed < place) {
      this.line++;
      this.feed = this.text.indexOf('\n', this.feed + 1);
    }
    return this.line;
  }
}
