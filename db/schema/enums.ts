import { pgEnum } from 'drizzle-orm/pg-core';
import {
  ENTRY_UNITS,
  GROUP_ORIGINS,
  IMPORT_STATES,
  ROLES,
  RUN_STATES,
  SCALES,
} from '#contract/enums';

export const roleEnum = pgEnum('role', ROLES);
export const scaleEnum = pgEnum('scale', SCALES);
export const runStateEnum = pgEnum('run_state', RUN_STATES);
export const entryUnitEnum = pgEnum('entry_unit', ENTRY_UNITS);
export const importStateEnum = pgEnum('import_state', IMPORT_STATES);
export const groupOriginEnum = pgEnum('group_origin', GROUP_ORIGINS);
export const outboxKindEnum = pgEnum('outbox_kind', [
  'plan',
  'blocks',
  'pair',
  'mail',
  'beat',
  'estimate',
  'import_estimate',
  'focus',
]);
