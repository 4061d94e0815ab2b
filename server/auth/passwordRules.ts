import { PASSWORD_MIN } from '#contract/accounts';

/**
 * Lists of the most common passwords hold next to nothing of 15 characters or more, the least
 * length here. What people do write at that length is refused by construction instead: a short
 * unit repeated, a walk along the keyboard, the alphabet or the digits, and these phrases (known
 * from passphrase examples and keyboard habits; from memory, common practice, not a counted list).
 */
const PHRASES: readonly string[] = [
  'correcthorsebatterystaple',
  'thequickbrownfox',
  'thequickbrownfoxjumpsoverthelazydog',
  'iloveyouforever',
  'iloveyousomuch',
  'letmeinletmein',
  'maytheforcebewithyou',
  'passwordpassword',
  'thisismypassword',
  'mypasswordispassword',
  'thisisapassword',
  'whatisthepassword',
  'changemechangeme',
  'administrator',
  'adminadministrator',
  'tobeornottobe',
  'tobeornottobethatisthequestion',
  'onceuponatime',
  'supercalifragilisticexpialidocious',
  'loremipsumdolorsitamet',
  'opensesameopensesame',
  'welcomewelcome',
  'trustno1trustno1',
  'nevergonnagiveyouup',
  'helloworldhelloworld',
];

/** Rows that fingers walk along, forwards or backwards, from anywhere, round and round. */
const WALKS: readonly string[] = [
  'abcdefghijklmnopqrstuvwxyz',
  '01234567890',
  '1234567890',
  'qwertyuiopasdfghjklzxcvbnm',
  'qwertyuiop',
  'asdfghjkl',
  'zxcvbnm',
  'qwertzuiopasdfghjklyxcvbnm',
  'azertyuiopqsdfghjklmwxcvbn',
  '1qaz2wsx3edc4rfv5tgb6yhn7ujm8ik9ol0p',
  'q1w2e3r4t5y6u7i8o9p0',
  '1q2w3e4r5t6y7u8i9o0p',
];

/** A password is a repetition where its whole length is made of one unit of at most this length. */
const LONGEST_UNIT = 6;
/** The fewest different characters. */
const FEWEST_CHARACTERS = 5;

export interface Person {
  readonly name: string;
  readonly email: string;
}

/** @returns why the password is too easy to guess and what to do, or null. */
export function weakness(password: string, person: Person): string | null {
  const bare = squeezed(password);
  if ([...new Set(password)].length < FEWEST_CHARACTERS || repeats(bare)) {
    return 'It repeats the same few characters; use several unrelated words.';
  }
  if (WALKS.some((walk) => walksAlong(bare, walk))) {
    return 'It follows the keyboard or the alphabet; use several unrelated words.';
  }
  if (PHRASES.some((phrase) => isMostly(bare, phrase))) {
    return 'Many people use this phrase; use several unrelated words of your own.';
  }
  const own = [person.name, person.email, person.email.split('@')[0] ?? ''].map(squeezed);
  if (own.some((word) => word.length >= 3 && (word === bare || isMostly(bare, word)))) {
    return `It is your name or e-mail address; use ${PASSWORD_MIN} characters that others do not know.`;
  }
  return null;
}

/** Lower case letters and digits only. */
function squeezed(text: string): string {
  return text
    .normalize('NFKD')
    .toLowerCase()
    .replace(/[^\p{L}\p{N}]/gu, '');
}

/** The phrase, with at most three characters before or after it, or the phrase repeated. */
function isMostly(bare: string, phrase: string): boolean {
  const rest = bare.split(phrase);
  return rest.length > 1 && rest.join('').length <= 3;
}

function repeats(bare: string): boolean {
  for (let unit = 1; unit <= LONGEST_UNIT && unit * 2 <= bare.length; unit++) {
    const tiled = bare.slice(0, unit).repeat(Math.ceil(bare.length / unit));
    if (tiled.slice(0, bare.length) === bare) return true;
  }
  return false;
}

function walksAlong(bare: string, walk: string): boolean {
  const round = walk.repeat(Math.ceil(bare.length / walk.length) + 1);
  return round.includes(bare) || [...round].reverse().join('').includes(bare);
}
