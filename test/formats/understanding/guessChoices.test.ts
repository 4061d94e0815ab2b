import { describe, expect, test } from 'vitest';
import { bring } from '../bring';

const guessed = async (text: string, name = 'pasted text') => {
  const { nodes, edges } = (await bring({ [name]: text })).guessed.columns;
  const parts = [nodes.id, nodes.label, nodes.entry, nodes.earliest, nodes.latest];
  const ends = [edges.source, edges.target, edges.weight, edges.time];
  return { nodes: parts, edges: ends };
};

describe('what the columns of a node table are', () => {
  test.each([
    ['id,label,entry,earliest,latest', 'a,A,1,0,2', ['id', 'label', 'entry', 'earliest', 'latest']],
    [
      'Species,Common name,First seen',
      'a,A,2024-01-01',
      ['Species', 'Common name', 'First seen', null, null],
    ],
    ['name,year', 'a,1999', ['name', null, 'year', null, null]],
    [
      'Station ID;Name;Commissioned',
      'S1;Pier;2020-01-01',
      ['Station ID', 'Name', 'Commissioned', null, null],
    ],
    ['firstSeen,nodeId', '3,a', ['nodeId', null, 'firstSeen', null, null]],
    ['reed,depth,seen on', 'a,2.5,2024-01-01', ['reed', null, 'seen on', null, null]],
    ['gene,day,order', 'a,4,Coleoptera', ['gene', null, 'day', null, null]],
    ['id,order,depth', 'a,Coleoptera,4', ['id', null, 'depth', null, null]],
    ['id,start,end', 'a,1,9', ['id', null, 'start', null, null]],
  ])('%s', async (header, row, expected) => {
    expect((await guessed(`${header}\n${row}\n`, 'nodes.csv')).nodes).toEqual(expected);
  });
});

describe('what the columns of an edge table are', () => {
  test.each([
    ['source,target,weight', 'a,b,1', ['source', 'target', 'weight', null]],
    ['From,To,First contact', 'a,b,2024-01-01', ['From', 'To', null, 'First contact']],
    ['FromNodeId\tToNodeId', '1\t2', ['FromNodeId', 'ToNodeId', null, null]],
    ['id,pollinator,plant,visits', '1,a,b,3', ['pollinator', 'plant', null, null]],
    ['predator,prey,strength,year', 'a,b,2,1999', ['predator', 'prey', 'strength', 'year']],
    ['target,source', 'a,b', ['source', 'target', null, null]],
  ])('%s', async (header, row, expected) => {
    expect((await guessed(`${header}\n${row}\n`, 'edges.csv')).edges).toEqual(expected);
  });

  test('without names, numbers are weights, and dates or rising large whole numbers are times', async () => {
    expect((await guessed('a b 3\nb c 2\n')).edges).toEqual([
      'column 1',
      'column 2',
      'column 3',
      null,
    ]);
    expect((await guessed('a b 2024-01-01\nb c 2023-01-01\n')).edges[3]).toBe('column 3');
    expect((await guessed('1 2 1082040961\n3 4 1082155839\n')).edges[3]).toBe('column 3');
    expect((await guessed('1 2 1082155839\n3 4 1082040961\n')).edges).toEqual([
      'column 1',
      'column 2',
      'column 3',
      null,
    ]);
  });
});

describe('what is asked', () => {
  test('nodes whose entry is missing are counted, and nothing stops the other guesses', async () => {
    const { asked } = await bring({ 'nodes.csv': 'id,entry\na,1\nb,\nc,NA\n' });
    expect(asked).toMatchObject([{ kind: 'missing', blocking: false }]);
    expect(asked[0]?.text).toMatch(/^2 nodes have no entry/);
  });

  test('a table in order has no question', async () => {
    expect((await bring({ 'nodes.csv': 'id,entry\na,1\nb,2\n' })).asked).toEqual([]);
  });
});
