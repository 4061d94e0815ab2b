import { gzipSync } from 'node:zlib';
import { afterAll, afterEach, beforeAll, describe, expect, test } from 'vitest';
import { networkForm, NODES_CSV } from '../support/factories';
import { BOUNDARY, MULTIPART, part, Uploading, wholeForm } from '../support/uploading';

let up: Uploading;
beforeAll(async () => {
  up = await Uploading.open();
});
afterAll(() => up.app.close());
afterEach(() => up.nothingLeft());

describe('a wrong form is refused, and nothing is saved', () => {
  test('a missing file is named by its field', async () => {
    await up.nothingSaved(async () => {
      const { status, problem } = await up.send({ nodes: null, edges: null });
      expect(status).toBe(422);
      expect(problem.issues?.map(({ field }) => field)).toEqual(['nodes', 'edges']);
    });
  });

  test.each([
    ['without a name', () => networkForm({ name: null }), 'name'],
    ['with an empty name', () => networkForm({ name: '  ' }), 'name'],
    ['with a long name', () => networkForm({ name: 'n'.repeat(161) }), 'name'],
    ['with a name of a megabyte', () => networkForm({ name: 'n'.repeat(1_000_000) }), 'name'],
    ['with a NUL in its name', () => networkForm({ name: 'a\u0000' }), 'name'],
    ['that sets a workspace', () => withField('workspaceId', 'x'), 'workspaceId'],
    ['that sets invented', () => withField('invented', 'true'), 'invented'],
    ['with a field __proto__', () => withField('__proto__', 'x'), '__proto__'],
    ['with a field twice', () => withField('name', 'Other'), 'name'],
    ['with a file as text', () => withText('nodes'), 'nodes'],
    ['with a file under another name', () => withFile('matrix'), 'matrix'],
    ['with a file twice', () => withFile('nodes'), 'nodes'],
  ])('%s', async (_kind, form, field) => {
    await up.nothingSaved(async () => {
      const { status, problem } = await up.owner.ask(up.path, { form: form() });
      expect(status).toBe(422);
      expect(problem.issues?.map((issue) => issue.field)).toContain(field);
    });
  });

  const withField = (name: string, value: string) => {
    const form = networkForm();
    form.append(name, value);
    return form;
  };
  const withText = (name: string) => {
    const form = networkForm();
    form.set(name, 'id,entry');
    return form;
  };
  const withFile = (name: string) => {
    const form = networkForm();
    form.append(name, new Blob([NODES_CSV]), 'x.csv');
    return form;
  };

  const body = Buffer.from(wholeForm());
  test.each([
    ['cut short', [body.subarray(0, -40)], MULTIPART, 400],
    ['empty', [], { ...MULTIPART, 'content-length': '0' }, 400],
    ['without its boundary', [body], { 'content-type': 'multipart/form-data' }, 415],
    ['with an empty boundary', [body], { 'content-type': 'multipart/form-data; boundary=' }, 400],
    ['as JSON', [Buffer.from('{}')], { 'content-type': 'application/json' }, 415],
    ['of no type', [body], {}, 415],
    ['compressed', [gzipSync(body)], { ...MULTIPART, 'content-encoding': 'gzip' }, 415],
  ])('%s', async (_kind, pieces, headers, status) => {
    await up.nothingSaved(async () => {
      const answer = await up.raw(pieces, headers);
      expect(answer?.status, answer?.text).toBe(status);
      expect(answer?.text).toContain('"code":');
    });
  });

  test('with a thousand parts', async () => {
    const many = Array.from({ length: 1000 }, (_, n) => part(`name="f${n}"`, 'x')).join('');
    const answer = await up.raw([Buffer.from(many + wholeForm())], MULTIPART);
    expect(answer?.status).toBe(422);
  });

  test('that ends early leaves no file behind', async () => {
    await up.nothingSaved(async () => {
      expect(await up.raw([body.subarray(0, -1)], MULTIPART, 'abort')).toBeNull();
      await up.nothingLeft();
    });
  });

  test('larger than two files can be is cut off while it comes', async () => {
    const chunk = Buffer.alloc(1024 * 1024, 'x');
    const start = Buffer.from(
      `--${BOUNDARY}\r\nContent-Disposition: form-data; name="nodes"; filename="n"\r\n\r\n`,
    );
    const answer = await up.raw([start, ...Array<Buffer>(120).fill(chunk)], MULTIPART);
    // The server answers before the client has sent everything; a client may miss the answer.
    expect([413, undefined]).toContain(answer?.status);
    await up.nothingLeft();
  });
});
