import { describe, expect, test } from 'vitest';
import { parseSpotList, type SpotListOptions } from '@/paving/spot-list';

const METRIC: SpotListOptions = { display: 'metric', bare: 'mm', datum: 0 };

const spotsOf = (text: string, options = METRIC) => {
  const list = parseSpotList(text, options);
  if (!list.ok) throw new Error(JSON.stringify(list.problems));
  return list.spots;
};
const problemsOf = (text: string, options = METRIC) => {
  const list = parseSpotList(text, options);
  return list.ok ? [] : list.problems.map(({ line, message }) => `${line}: ${message}`);
};

describe('a list of spots', () => {
  test('three columns are across, up and level; four begin with a name', () => {
    expect(spotsOf('0,0,-40\n6400,0,-260')).toEqual([
      { at: [0, 0], level: -40 },
      { at: [6400, 0], level: -260 },
    ]);
    expect(spotsOf('Gate, 0, 3.2 m, −40\n')).toEqual([{ name: 'Gate', at: [0, 3200], level: -40 }]);
  });

  test('headings put the columns in any order, and further ones are passed over', () => {
    expect(spotsOf('\uFEFFZ (mm);Note;Easting;Northing\n-12;by the wall;100;200\n')).toEqual([
      { at: [100, 200], level: -12 },
    ]);
  });

  test('tabs as a spreadsheet copies them, decimal commas and empty lines', () => {
    expect(spotsOf('0\t0\t0,5\r\n\r\n1,5\t2\t-0,25\r\n', { ...METRIC, bare: 'm' })).toEqual([
      { at: [0, 0], level: 500 },
      { at: [1500, 2000], level: -250 },
    ]);
  });

  test('a survey’s own heights are taken from what it calls the edge’s top', () => {
    // Metres, the edge at 100.350: 100.11 lies 240 mm below it.
    expect(spotsOf('A,1,2,100.11', { ...METRIC, bare: 'm', datum: 100_350 })).toEqual([
      { name: 'A', at: [1000, 2000], level: -240 },
    ]);
  });

  test('feet and inches', () => {
    const imperial: SpotListOptions = { display: 'imperial', bare: 'in', datum: 0 };
    expect(spotsOf(`10' 6",0,-2.5`, imperial)[0]).toEqual({ at: [3200.4, 0], level: -63.5 });
    expect(spotsOf('10,5,-0.5', { ...imperial, bare: 'ft' })[0]).toEqual({
      at: [3048, 1524],
      level: -152.4,
    });
  });

  test('every bad line is named, and nothing is taken by halves', () => {
    const problems = problemsOf('0,0,-40\nfoo,0,1\n5,5\n1,2,3,4,5\n0,0.2,7\n9,9,99999');
    expect(problems.map((problem) => problem.split(':')[0])).toEqual(['2', '3', '4', '5', '6']);
    expect(problems[0]).toContain('“foo” is not a length');
    expect(problems[1]).toContain('has 2 cells filled in');
    expect(problems[2]).toContain('has 5 cells');
    expect(problems[3]).toContain('same place as line 1');
    expect(problems[4]).toContain('more than 10 m');
  });

  test('a decimal comma among commas is not taken for another cell, under headings either', () => {
    expect(problemsOf('x,y,level\n3,2,1,5,-40')[0]).toContain('5 cells under 3 headings');
    expect(spotsOf('x,y,level\n3200,1500,-40,,')).toEqual([{ at: [3200, 1500], level: -40 }]);
  });

  test('each spot knows its line, headings and empty lines counted', () => {
    const list = parseSpotList('x,y,level\n\n0,0,-40\n\n100,0,-50\n', METRIC);
    expect(list).toMatchObject({ ok: true, lines: [3, 5] });
  });

  test('headings without a level, headings alone and nothing at all say so', () => {
    expect(problemsOf('name,x,y\nA,1,2')[0]).toContain('lack level');
    expect(problemsOf('x,y,level\n')[0]).toContain('no spot below');
    expect(problemsOf(' \n\n')[0]).toContain('nothing here yet');
  });
});
