import { customType, timestamp } from 'drizzle-orm/pg-core';

/** Raw bytes; what they hold is said by the codec that wrote them (db/codecs). */
export const bytea = customType<{ data: Uint8Array; driverData: Buffer }>({
  dataType: () => 'bytea',
  toDriver: (value) => Buffer.from(value.buffer, value.byteOffset, value.byteLength),
});

/** A moment with its zone, as a JavaScript Date. */
export const moment = (name: string) => timestamp(name, { withTimezone: true, mode: 'date' });
