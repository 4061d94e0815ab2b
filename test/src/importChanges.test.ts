import { describe, expect, it } from 'vitest';
import type { ChangeImportRequest } from '#contract/imports';
import { withChanges, withOneMore } from '../../src/stores/importChanges';
import { draftOf } from './importDraft';

const { choices } = draftOf();
const rows = { ...choices, order: { kind: 'rows' } as const };
const late = { ...rows, missing: 'last' } as const;

describe('changes of an import that wait to be read', () => {
  it('are one where both are choices: the later holds', () => {
    const waiting = withOneMore(withOneMore([], { choices: rows }), { choices: late });
    expect(waiting).toEqual([{ choices: late }]);
  });

  it('keep what was said about each file, the later about one file in place of the earlier', () => {
    const of = (position: number, role: 'nodes' | 'edges'): ChangeImportRequest => ({
      hints: [{ position, hint: { role } }],
    });
    const waiting = [of(0, 'nodes'), of(1, 'edges'), of(0, 'edges')].reduce<
      readonly ChangeImportRequest[]
    >(withOneMore, []);
    expect(waiting).toEqual([
      {
        hints: [
          { position: 1, hint: { role: 'edges' } },
          { position: 0, hint: { role: 'edges' } },
        ],
      },
    ]);
  });

  it('stay in their order where they are of two kinds', () => {
    const hints = [{ position: 0, hint: { role: 'nodes' as const } }];
    const waiting = withOneMore(withOneMore([], { hints }), { choices: rows });
    expect(waiting).toEqual([{ hints }, { choices: rows }]);
  });

  it('show in the fields before they are read', () => {
    const reading = { delimiter: ';' as const };
    const shown = withChanges(draftOf(), [
      { hints: [{ position: 1, hint: { reading } }] },
      { choices: late, name: 'Fen' },
    ]);
    expect(shown.files[1]!.reading).toMatchObject({ delimiter: ';', encoding: 'utf-8' });
    expect(shown.files[0]!.reading).toMatchObject({ delimiter: ',' });
    expect(shown).toMatchObject({ choices: late, name: 'Fen' });
  });

  it('show what was guessed where the choices are taken back', () => {
    const shown = withChanges(draftOf({ choices: late }), [{ choices: null }]);
    expect(shown.choices).toEqual(choices);
  });
});
