import { GrowingNumbers } from './growing';
import { columnNames } from './rawTable';
import { TextStore } from './textStore';
import type { RawRow } from './types';

interface Column {
  readonly name: string;
  readonly own: boolean;
  used: boolean;
  /** Text of elements that give none. */
  standard: string;
  /** Row + 1 that was set last, so that a second value is noticed. */
  lastRow: number;
}

/**
 * The nodes or the edges of a graph file, row by row, each with the few cells that it has: linked
 * lists of numbers in typed arrays, so that an element without attributes costs twelve bytes and a
 * cell as many. Rows may be filled in any order (a group's nodes come within the group).
 */
export class ElementRows {
  private readonly columns: Column[] = [];
  private readonly byName = new Map<string, number>();
  private readonly texts = new TextStore();
  private readonly lines = new GrowingNumbers();
  /** Per row 1 + its last cell, per cell its column, text and 1 + the cell before it. */
  private readonly last = new GrowingNumbers();
  private readonly cellColumn = new GrowingNumbers();
  private readonly cellText = new GrowingNumbers();
  private readonly cellBefore = new GrowingNumbers();

  /**
   * @param own columns of the format itself, in their order
   * @param always those of them that stand even where nothing uses them
   */
  constructor(own: readonly string[], always: readonly string[]) {
    for (const name of own) {
      const index = this.columns.push(newColumn(name, { own: true })) - 1;
      this.byName.set(`own ${name}`, index);
      if (always.includes(name)) this.use(index);
    }
  }

  get count(): number {
    return this.lines.length;
  }

  get columnCount(): number {
    return this.columns.length;
  }

  /** The index of a column of the format itself. */
  own(name: string): number {
    return this.byName.get(`own ${name}`) ?? this.attribute(name);
  }

  /** The index of the attribute that is known by a key (its name unless told otherwise). */
  attribute(name: string, key = name): number {
    const known = this.byName.get(`attribute ${key}`);
    if (known !== undefined) return known;
    const index = this.columns.push(newColumn(name, { own: false })) - 1;
    this.byName.set(`attribute ${key}`, index);
    return index;
  }

  /** Gives elements that have no value of a column this one; the column then counts as used. */
  setStandard(column: number, text: string): void {
    const found = this.columns[column];
    if (!found) return;
    found.standard = text;
    found.used = true;
  }

  isUsed(column: number): boolean {
    return this.columns[column]?.used ?? false;
  }

  private use(column: number): void {
    const found = this.columns[column];
    if (found) found.used = true;
  }

  /** @returns the number of a new row, from 0 */
  begin(line: number): number {
    this.last.push(0);
    return this.lines.push(line);
  }

  /** @returns false, and changes nothing, where the row has a value of the column already */
  set(row: number, column: number, text: string): boolean {
    const found = this.columns[column];
    if (!found || found.lastRow === row + 1) return false;
    found.lastRow = row + 1;
    found.used = true;
    this.cellColumn.push(column);
    this.cellText.push(this.texts.add(text));
    const cell = this.cellBefore.push(this.last.at(row));
    this.last.set(row, cell + 1);
    return true;
  }

  /**
   * Columns in use: first those of the format, each the format's own or an attribute that is called
   * so where the format has none, then the other attributes as they were first met.
   */
  finish(): { columns: string[]; rows: () => Generator<RawRow>; cells: number } {
    const order = this.order();
    const columns = columnNames(order.map(({ name }) => name));
    const place = new Int32Array(this.columns.length).fill(-1);
    for (const [at, { index }] of order.entries()) place[index] = at;
    const standard = order.map(({ index }) => this.columns[index]?.standard ?? '');
    return {
      columns,
      rows: () => this.rows(place, standard),
      cells: columns.length * this.count,
    };
  }

  private order(): { name: string; index: number }[] {
    const all = this.columns.map((column, index) => ({ ...column, index }));
    const attributes = all.filter(({ own, used }) => !own && used);
    const first = all
      .filter(({ own }) => own)
      .flatMap((column) => {
        if (column.used) return [column];
        const same = attributes.findIndex(({ name }) => name.normalize('NFC') === column.name);
        return same < 0 ? [] : attributes.splice(same, 1);
      });
    const taken = new Set(first.map(({ name }) => name.normalize('NFC')));
    const rest = attributes.map(({ name, index }) => ({
      name: taken.has(name.normalize('NFC')) ? `${name} (attribute)` : name,
      index,
    }));
    return [...first.map(({ name, index }) => ({ name, index })), ...rest];
  }

  private *rows(place: Int32Array, standard: readonly string[]): Generator<RawRow> {
    for (let row = 0; row < this.count; row++) {
      const cells = [...standard];
      // From the last cell to the first, so that the first value of a column stays.
      for (let cell = this.last.at(row); cell > 0; cell = this.cellBefore.at(cell - 1)) {
        const at = place[this.cellColumn.at(cell - 1)] ?? -1;
        if (at >= 0) cells[at] = this.texts.get(this.cellText.at(cell - 1));
      }
      yield { line: this.lines.at(row), cells };
    }
  }
}

const newColumn = (name: string, { own }: { own: boolean }): Column => ({
  name,
  own,
  used: false,
  standard: '',
  lastRow: 0,
});
