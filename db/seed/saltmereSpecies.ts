/**
 * What a species does in the fen, as far as the invented survey saw it. The members of a guild feed
 * on, or pollinate, the members of others (`FEEDING`), never each other.
 */
export type Guild =
  | 'waterPlant'
  | 'bankPlant'
  | 'grazer'
  | 'pollinator'
  | 'hunter'
  | 'fish'
  | 'waterfowl'
  | 'songbird'
  | 'stalker';

/** English names of common animals and plants, with the guild of each. */
export const SPECIES: Readonly<Record<Guild, readonly string[]>> = {
  waterPlant: ['Common duckweed', 'Hornwort', 'Water crowfoot', 'Curled pondweed', 'Brooklime'],
  bankPlant: [
    'Common reed',
    'Yellow flag',
    'Purple loosestrife',
    'Water mint',
    'Marsh marigold',
    'Meadowsweet',
    'Ragged robin',
    'Marsh thistle',
  ],
  grazer: [
    'Great pond snail',
    'Great ramshorn',
    'Water flea',
    'Freshwater shrimp',
    'Pond olive mayfly',
    'Water hog-louse',
  ],
  pollinator: [
    'Buff-tailed bumblebee',
    'Common carder bee',
    'Drone fly',
    'Marmalade hoverfly',
    'Green-veined white',
    'Small tortoiseshell',
  ],
  hunter: ['Emperor dragonfly', 'Blue-tailed damselfly', 'Great diving beetle', 'Raft spider'],
  fish: ['Three-spined stickleback', 'Roach', 'Tench'],
  waterfowl: ['Mallard', 'Teal', 'Coot', 'Moorhen', 'Tufted duck'],
  songbird: ['Reed warbler', 'Sedge warbler', 'Reed bunting', 'Swallow'],
  stalker: ['Grey heron', 'Little egret', 'Common frog', 'Smooth newt', 'Otter'],
};

/** How likely it is that a member of the first guild was seen feeding on (or visiting) one of the second. */
export const FEEDING: readonly (readonly [Guild, Guild, number])[] = [
  ['grazer', 'waterPlant', 0.5],
  ['pollinator', 'bankPlant', 0.1],
  ['hunter', 'grazer', 0.06],
  ['hunter', 'pollinator', 0.1],
  ['fish', 'waterPlant', 0.4],
  ['fish', 'grazer', 0.6],
  ['waterfowl', 'waterPlant', 0.75],
  ['waterfowl', 'bankPlant', 0.03],
  ['waterfowl', 'grazer', 0.75],
  ['songbird', 'bankPlant', 0.03],
  ['songbird', 'pollinator', 0.12],
  ['songbird', 'hunter', 0.2],
  ['stalker', 'fish', 0.3],
  ['stalker', 'hunter', 0.1],
  ['stalker', 'grazer', 0.05],
];

/** Survey days between which a guild settles: plants first, what eats them after them. */
export const SETTLING: Readonly<Record<Guild, readonly [number, number]>> = {
  waterPlant: [2, 90],
  bankPlant: [8, 170],
  grazer: [10, 150],
  pollinator: [40, 230],
  hunter: [50, 260],
  fish: [70, 270],
  waterfowl: [20, 280],
  songbird: [60, 300],
  stalker: [80, 330],
};
