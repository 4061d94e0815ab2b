import type { FileIssue } from './types';

/** Issues that are listed unless told otherwise; those past it are only counted. */
const LISTED = 200;

/** Everything that is wrong with the files of one network. */
export class IssueList {
  readonly listed: FileIssue[] = [];
  leftOut = 0;

  constructor(private readonly most = LISTED) {}

  add(issue: FileIssue): void {
    if (this.listed.length < this.most) this.listed.push(issue);
    else this.leftOut++;
  }

  get any(): boolean {
    return this.listed.length > 0;
  }
}

/** @returns the text quoted for a message, cut where it is long; what cannot be stored is shown as �. */
export function quoted(text: string): string {
  const shown = [...text.slice(0, 80)].slice(0, 40).join('');
  const rest = shown.length < text.length ? '…' : '';
  return `“${shown.replace(/[\0\p{Surrogate}]/gu, '\ufffd')}${rest}”`;
}
