/** A graph file that cannot be read on from a line. */
export class Unreadable extends Error {
  override readonly name = 'Unreadable';
  constructor(
    readonly line: number | undefined,
    message: string,
    readonly field?: string,
  ) {
    super(message);
  }
}
