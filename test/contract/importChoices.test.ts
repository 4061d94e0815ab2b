import { expect, expectTypeOf, test } from 'vitest';
import * as contract from '../../server/contract/importChoices';
import { NOTHING_FOUND, type Found } from '../../formats/understanding/found';
import type { ImportChoices, Question } from '../../formats/understanding/choices';
import type { SourceHint, TextReading } from '../../formats/sources/types';
import type { FileIssue } from '../../formats/types';
import type { Issue } from '../../server/contract/problems';

/** Read-only all the way down, so that only names and values are compared. */
type Frozen<T> = T extends object ? { readonly [K in keyof T]: Frozen<T[K]> } : T;

test('the contract has the shapes of what the readers give and take', () => {
  expectTypeOf<Frozen<contract.ImportChoices>>().toEqualTypeOf<Frozen<ImportChoices>>();
  expectTypeOf<Frozen<contract.ImportQuestion>>().toEqualTypeOf<Frozen<Question>>();
  expectTypeOf<Frozen<contract.ImportFound>>().toEqualTypeOf<Frozen<Found>>();
  expectTypeOf<Frozen<contract.TextReading>>().toEqualTypeOf<Frozen<TextReading>>();
  expectTypeOf<Frozen<contract.SourceHint>>().toEqualTypeOf<Frozen<SourceHint>>();
  expectTypeOf<FileIssue>().toExtend<Issue>();
});

test('counts that say nothing pass the contract, and an unknown one does not', () => {
  expect(contract.importFound.parse(NOTHING_FOUND)).toEqual(NOTHING_FOUND);
  expect(contract.importFound.safeParse({ ...NOTHING_FOUND, knots: 1 }).success).toBe(false);
});
