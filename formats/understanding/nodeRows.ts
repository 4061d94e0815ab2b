import { quoted, type IssueList } from '../issues';
import { ownText } from '../sources/ownText';
import type { FormatLimits } from '../types';
import type { DraftNode, RawTimes } from './draft';
import type { PickedTable } from './tables';

/** The nodes as they become known: first the rows of the node table, then ends of edges without one. */
export class NodeList {
  readonly nodes: DraftNode[] = [];
  /** Row of every id, the key being the id in NFC. */
  private readonly rowOf = new Map<string, number>();
  private past = 0;

  constructor(
    private readonly limits: FormatLimits,
    private readonly issues: IssueList,
  ) {}

  row(id: string): number | undefined {
    // Most ids are plain, and are found without being normalised.
    return this.rowOf.get(id) ?? this.rowOf.get(id.normalize('NFC'));
  }

  /** Adds a row of the node table. */
  addListed(node: Omit<DraftNode, 'listed'>): void {
    if (this.full()) return;
    const { file, line, id } = node;
    this.checkNames(node);
    const earlier = this.row(id);
    if (id !== '' && earlier !== undefined) {
      this.issues.add({
        file,
        line,
        field: 'id',
        message: `The id ${quoted(id)} stands already on line ${this.nodes[earlier]?.line}. Every node needs an id of its own.`,
      });
    } else if (id !== '') this.rowOf.set(id.normalize('NFC'), this.nodes.length);
    this.nodes.push({ ...node, listed: true });
  }

  /** Adds a node that something else names. @returns its row, or undefined past the limit */
  addNamed(id: string, place: { file: string; line: number }): number | undefined {
    if (this.full()) return undefined;
    const own = ownText(id);
    const node = { ...place, id: own, label: own, listed: false, raw: NO_RAW };
    this.checkNames(node);
    this.rowOf.set(own.normalize('NFC'), this.nodes.length);
    return this.nodes.push(node) - 1;
  }

  private full(): boolean {
    if (this.nodes.length < this.limits.nodes) return false;
    this.past++;
    return true;
  }

  /** Reports too many nodes, once. @param file the file that names them */
  checkCount(file: string): void {
    if (this.past === 0) return;
    this.issues.add({
      file,
      message: `There are more than ${this.limits.nodes} nodes; at most ${this.limits.nodes} can be stored. Leave the others out.`,
    });
  }

  private checkNames({ file, line, id, label }: Omit<DraftNode, 'listed'>): void {
    const add = (field: string, message: string) => this.issues.add({ file, line, field, message });
    if (id === '') add('id', 'The id is empty. Give every node an id of its own.');
    for (const [field, text] of [
      ['id', id],
      ['label', label],
    ] as const) {
      if (field === 'label' && text === id) continue;
      if (text.length > this.limits.labelCharacters) {
        add(
          field,
          `${quoted(text)} is ${text.length} characters long; at most ${this.limits.labelCharacters} are kept. Shorten it.`,
        );
      }
      const broken = brokenText(text);
      if (broken) add(field, `${quoted(text)} ${broken}`);
    }
  }
}

const NO_RAW: RawTimes = { entry: '', earliest: '', latest: '' };

/** @returns what makes a text impossible to store, or null */
export function brokenText(text: string): string | null {
  if (text.includes('\0')) return 'holds a NUL character. Remove it.';
  if (/\p{Surrogate}/u.test(text))
    return 'holds half of a character (a lone surrogate). Remove it.';
  return null;
}

/** Which cells of a node row are read; -1 for none. */
export interface NodeIndices {
  readonly id: number;
  readonly label: number;
  readonly entry: number;
  readonly earliest: number;
  readonly latest: number;
}

/** Reads every row of the node table into the list. */
export function readNodeRows({ file, table }: PickedTable, at: NodeIndices, list: NodeList): void {
  for (const { line, cells } of table.rows()) {
    const id = cells[at.id] ?? '';
    const label = cells[at.label] ?? '';
    list.addListed({
      file,
      line,
      id,
      label: label === '' ? id : label,
      raw: {
        entry: cells[at.entry] ?? '',
        earliest: cells[at.earliest] ?? '',
        latest: cells[at.latest] ?? '',
      },
    });
  }
}
