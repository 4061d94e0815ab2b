import { describe, expect, it } from 'vitest';
import {
  formatBytes,
  formatDimensions,
  formatNoun,
  formatTimeLeft,
} from '../../src/composables/localeFormat';

describe('words for counts, bytes, dimensions and time left', () => {
  it('one thing is singular, none and several are plural', () => {
    expect(formatNoun(1, 'node')).toBe('1 node');
    expect(formatNoun(0, 'node')).toBe('0 nodes');
    expect(formatNoun(2, 'leaf', 'leaves')).toBe('2 leaves');
  });

  it('bytes are counted in powers of 1024', () => {
    expect(formatBytes(1)).toBe('1 byte');
    expect(formatBytes(1023)).toMatch(/023 bytes$/);
    expect(formatBytes(1024)).toBe('1 KiB');
    expect(formatBytes(50 * 1024 * 1024)).toBe('50 MiB');
  });

  it('three or more dimensions without a gap are a range, others a list', () => {
    expect(formatDimensions([1, 2, 3])).toBe('1–3');
    expect(formatDimensions([0, 2, 3])).toBe('0, 2, 3');
    expect(formatDimensions([1, 2])).toBe('1, 2');
    expect(formatDimensions([2])).toBe('2');
  });

  it('time left never promises less than is left', () => {
    expect(formatTimeLeft(0)).toBe('about a second left');
    expect(formatTimeLeft(12_001)).toBe('about 13 seconds left');
    expect(formatTimeLeft(91_000)).toBe('about 2 minutes left');
    expect(formatTimeLeft(2 * 3_600_000 + 1)).toBe('about 3 hours left');
  });
});
