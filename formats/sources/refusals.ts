/** Beginnings of files that are no text, and what to do about each. */
const KINDS: readonly { readonly starts: readonly number[]; readonly sentence: string }[] = [
  {
    starts: [0x1f, 0x8b],
    sentence: 'It is compressed (gzip). Unpack it and bring the file inside.',
  },
  {
    starts: [0x50, 0x4b, 0x03, 0x04],
    sentence:
      'It is a ZIP archive or a spreadsheet. Unpack it, or save the sheet as CSV, and bring that.',
  },
  { starts: [0x50, 0x4b, 0x05, 0x06], sentence: 'It is an empty ZIP archive.' },
  { starts: [0x89, 0x50, 0x4e, 0x47], sentence: 'It is a picture (PNG), not a table or a graph.' },
  { starts: [0xff, 0xd8, 0xff], sentence: 'It is a picture (JPEG), not a table or a graph.' },
  { starts: [0x47, 0x49, 0x46, 0x38], sentence: 'It is a picture (GIF), not a table or a graph.' },
  {
    starts: [0x25, 0x50, 0x44, 0x46],
    sentence: 'It is a PDF document. Save the table in it as CSV and bring that.',
  },
  {
    starts: [0xd0, 0xcf, 0x11, 0xe0],
    sentence: 'It is an old spreadsheet or document. Save the sheet as CSV and bring that.',
  },
  { starts: [0xfd, 0x37, 0x7a, 0x58, 0x5a], sentence: 'It is compressed (xz). Unpack it first.' },
  { starts: [0x28, 0xb5, 0x2f, 0xfd], sentence: 'It is compressed (zstd). Unpack it first.' },
  { starts: [0x37, 0x7a, 0xbc, 0xaf], sentence: 'It is a 7z archive. Unpack it first.' },
  { starts: [0x7f, 0x45, 0x4c, 0x46], sentence: 'It is a program, not a table or a graph.' },
  {
    starts: [0x50, 0x41, 0x52, 0x31, 0x15],
    sentence: 'It is a Parquet file. Save the table as CSV and bring that.',
  },
];

/** @returns a plain sentence if the bytes begin like something that is no text, else null. */
export function refusalOf(bytes: Uint8Array): string | null {
  if (bytes.length === 0) return 'The file is empty.';
  const kind = KINDS.find(({ starts }) => starts.every((byte, at) => bytes[at] === byte));
  return kind?.sentence ?? null;
}
