import { GrowingNumbers } from './growing';
import { ownText } from './ownText';

/** Short texts that come again and again (ends of edges, weights) are kept once. */
const REMEMBERED = 32_768;
const SHORT = 100;
/** Bytes of a block of the other texts. */
const BLOCK = 1_048_576;

/**
 * Texts by number, in little more room than they take in the file. Texts past the first 32,768 are
 * bytes outside the heap, made texts again when they are asked for.
 */
export class TextStore {
  private readonly numberOf = new Map<string, number>();
  private readonly remembered: string[] = [];
  private readonly blocks: Buffer[] = [];
  private free = BLOCK;
  private readonly blockOf = new GrowingNumbers();
  private readonly from = new GrowingNumbers();
  private readonly to = new GrowingNumbers();

  /** @param text without lone surrogates @returns its number: even if remembered, odd if stored */
  add(text: string): number {
    const known = this.numberOf.get(text);
    if (known !== undefined) return known;
    if (this.remembered.length === REMEMBERED || text.length > SHORT) return this.store(text);
    const own = ownText(text);
    const number = 2 * (this.remembered.push(own) - 1);
    this.numberOf.set(own, number);
    return number;
  }

  get(number: number): string {
    const at = number >>> 1;
    if (number % 2 === 0) return this.remembered[at] ?? '';
    const block = this.blocks[this.blockOf.at(at)];
    return block?.toString('utf8', this.from.at(at), this.to.at(at)) ?? '';
  }

  private store(text: string): number {
    const bytes = Buffer.byteLength(text, 'utf8');
    if (this.free + bytes > BLOCK) {
      this.blocks.push(Buffer.allocUnsafeSlow(Math.max(BLOCK, bytes)));
      this.free = 0;
    }
    const last = this.blocks.length - 1;
    this.blocks[last]?.write(text, this.free, 'utf8');
    this.from.push(this.free);
    this.to.push(this.free + bytes);
    this.free += bytes;
    return 2 * this.blockOf.push(last) + 1;
  }
}
