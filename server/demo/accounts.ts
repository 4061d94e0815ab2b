import type { Instance } from '#contract/accounts';
import type { Role } from '#contract/enums';

export type DemoAccount = NonNullable<Instance['demoAccounts']>[number];

/** One password for all of them: it opens nothing but invented data on a private machine. */
const PASSWORD = 'wet boots and reed beds';

const NAMES: Readonly<Record<Role, readonly [string, string, string]>> = {
  owner: ['Isolde Marram', 'Perran Sallow', 'Hesper Withy'],
  analyst: ['Tamsin Eyot', 'Corin Rushmere', 'Odile Fenwater'],
  recorder: ['Brynna Causey', 'Sorrel Levels', 'Ansel Dykeman'],
  reviewer: ['Linnet Osierby', 'Jory Saltern', 'Merrin Holt'],
};

/** The invented people of a demo instance, three of each role; nowhere else do they exist. */
export const DEMO_ACCOUNTS: readonly DemoAccount[] = Object.entries(NAMES).flatMap(
  ([role, names]) =>
    names.map((name) => ({
      name,
      email: `${name.toLowerCase().replaceAll(' ', '.')}@example.org`,
      password: PASSWORD,
      role: role as Role,
    })),
);
