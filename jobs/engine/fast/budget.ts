import { EngineLimitError, type Limits } from '../types';

/** Whose memory typed arrays lie in: one thread's, or memory that others may read, too. */
export type Memory = 'own' | 'shared';

/** Accounts the bytes of every typed array against the limit; heap limits do not see them. */
export class Budget {
  /** Bytes held now. */
  used = 0;
  /** Most bytes held at once. */
  peak = 0;

  constructor(
    readonly limits: Limits,
    private readonly memory: Memory = 'own',
  ) {}

  int32(length: number): Int32Array {
    return new Int32Array(this.buffer(4 * length));
  }

  /** Int32Array filled with -1, the mark of "none". */
  none(length: number): Int32Array {
    return this.int32(length).fill(-1);
  }

  uint8(length: number): Uint8Array {
    return new Uint8Array(this.buffer(length));
  }

  float64(length: number): Float64Array {
    return new Float64Array(this.buffer(8 * length));
  }

  release(array: { readonly byteLength: number }): void {
    this.used -= array.byteLength;
  }

  private buffer(bytes: number): ArrayBuffer | SharedArrayBuffer {
    this.take(bytes);
    return this.memory === 'shared' ? new SharedArrayBuffer(bytes) : new ArrayBuffer(bytes);
  }

  /** Counts bytes that are held somewhere. @throws EngineLimitError past the limit */
  take(bytes: number): void {
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
