import { EngineLimitError, type Limits } from '../types';

/** Accounts the bytes of every typed array against the limit; heap limits do not see them. */
export class Budget {
  /** Bytes held now. */
  used = 0;
  /** Most bytes held at once. */
  peak = 0;

  constructor(readonly limits: Limits) {}

  int32(length: number): Int32Array {
    this.take(4 * length);
    return new Int32Array(length);
  }

  /** Int32Array filled with -1, the mark of "none". */
  none(length: number): Int32Array {
    return this.int32(length).fill(-1);
  }

  uint8(length: number): Uint8Array {
    this.take(length);
    return new Uint8Array(length);
  }

  float64(length: number): Float64Array {
    this.take(8 * length);
    return new Float64Array(length);
  }

  release(array: { readonly byteLength: number }): void {
    this.used -= array.byteLength;
  }

  private take(bytes: number): void {
    const needed = this.used + bytes;
    if (needed > this.limits.bytes) {
      throw new EngineLimitError(
        'bytes',
        needed,
        this.limits.bytes,
        `The computation needs ${needed} bytes of tables; ${this.limits.bytes} bytes are allowed.`,
      );
    }
    this.used = needed;
    if (needed > this.peak) this.peak = needed;
  }
}
