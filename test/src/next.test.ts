import { describe, expect, it } from 'vitest';
import { pathAfterSignIn } from '../../src/router/next';

describe('where a person goes after signing in', () => {
  it('a path of this site is followed', () => {
    expect(pathAfterSignIn('/workspaces/1?pair=2')).toBe('/workspaces/1?pair=2');
  });

  it.each([
    ['//evil.example'],
    ['/\\evil.example'],
    ['https://evil.example'],
    [undefined],
    [['/a']],
  ])('anything else leads home: %s', (next) => {
    expect(pathAfterSignIn(next)).toBe('/');
  });
});
