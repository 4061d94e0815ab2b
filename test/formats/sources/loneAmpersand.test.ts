import { expect, test } from 'vitest';
import { loneAmpersand } from '../../../formats/sources/loneAmpersand';

test.each([
  ['<a b="&amp;&#65;&#x41;&own;"/>', -1],
  ['<a b="R & D"/>', 8],
  ['<a>&amp &amp;</a>', 3],
  ['<!-- & --><!-- & --><![CDATA[ & ]]><a>&</a>', 38],
  ['<a/><!-- & <b>&</b>', -1],
  ['&', 0],
])('the first & of %s that begins no reference is found', (text, at) => {
  expect(loneAmpersand(text)).toBe(at);
});
