const REFERENCE = /&(?:#\d{1,10}|#x[\da-f]{1,8}|[A-Za-z_][\w.-]{0,60});/iy;
/** Stretches in which an & is a letter like any other. */
const QUIET: readonly (readonly [open: string, close: string])[] = [
  ['<!--', '-->'],
  ['<![CDATA[', ']]>'],
];

/** Where the first & of an XML text stands that begins no reference; -1 if there is none. Linear. */
export function loneAmpersand(text: string): number {
  const next = QUIET.map(([open]) => text.indexOf(open));
  for (let at = text.indexOf('&'); at >= 0; at = text.indexOf('&', at)) {
    let passed = at;
    for (const [index, [open, close]] of QUIET.entries()) {
      let begin = next[index] ?? -1;
      while (begin >= 0 && begin < at) {
        const end = text.indexOf(close, begin);
        if (end < 0) return -1;
        passed = Math.max(passed, end);
        begin = text.indexOf(open, end);
      }
      next[index] = begin;
    }
    if (passed === at) {
      REFERENCE.lastIndex = at;
      if (!REFERENCE.test(text)) return at;
      passed = at + 1;
    }
    at = passed;
  }
  return -1;
}
