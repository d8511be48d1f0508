import { describe, expect, it } from 'vitest';
import { checkLines, MOST_LINES } from './check-lines.ts';

const known = (files: string[], over: Partial<Parameters<typeof checkLines>[1]> = {}) => ({
  files,
  engines: ['Orvane Kestle 1.6'],
  present: new Set<string>(),
  newEngines: false,
  ...over,
});
const texts = (csv: string, files: string[], over = {}) =>
  checkLines(csv, known(files, over)).lines.map(({ line, verdict, text }) =>
    `${line} ${verdict} ${text}`.trim(),
  );

describe('checkLines()', () => {
  it('takes comma, semicolon and tab, quotes, a byte-order mark and names in any case', () => {
    for (const csv of [
      'File,Title,Cylinders\na.csv,"Cam, late",4\n',
      '\uFEFFfile;title;cylinders\r\na.csv;"Cam, late";4\r\n',
      'file\ttitle\tcylinders\na.csv\tCam, late\t4',
    ]) {
      const { lines } = checkLines(csv, known(['A.CSV']));
      expect(lines[0]).toMatchObject({ line: 2, title: 'Cam, late', cylinders: 4, verdict: 'good' });
    }
  });

  it('puts engine and condition into the note, which the capture is born with', () => {
    const csv = 'file,note,make,model,code,condition\na.csv,Seen twice,Orvane,Kestle 1.6,OK16,cranking\n';
    expect(checkLines(csv, known(['a.csv'])).lines[0]?.note).toBe(
      'Seen twice\nEngine: Orvane Kestle 1.6, OK16.\nCondition: cranking.',
    );
  });

  it('says for every line what is wrong with it', () => {
    const csv = [
      'file,title,cylinders,make,model',
      'a.csv,One,4,Orvane,Kestle 1.6',
      'a.csv,Two,4,,',
      'b.csv,Three,forty,,',
      ',Four,,,',
      'missing.csv,Five,,,',
      'c.csv,Six,4,Orvane,Kestel 1.6',
      'd.csv,Seven,4,Brumal,Tarn',
      'e.csv,One,4,,',
    ].join('\n');
    expect(texts(csv, ['a.csv', 'b.csv', 'c.csv', 'd.csv', 'e.csv'])).toEqual([
      '2 good',
      '3 bad “a.csv” stands in line 2 already. One line a file.',
      '4 bad “forty” cylinders: a whole number from 1 to 16 is expected.',
      '5 bad No file is named.',
      '6 bad “missing.csv” is not among the files chosen.',
      '7 bad The library has no engine “Orvane Kestel 1.6”. Is “Orvane Kestle 1.6” meant?',
      '8 bad The library has no engine “Brumal Tarn”. Tick “new engines are meant” if it is new.',
      '9 watch The same title as line 2.',
    ]);
  });

  it('takes new engines where they are meant', () => {
    expect(texts('file,make,model\nd.csv,Brumal,Tarn\n', ['d.csv'], { newEngines: true })).toEqual([
      '2 good',
    ]);
  });

  it('counts lines as an editor does when a cell holds several', () => {
    expect(texts('file,note\n"a.csv","one\ntwo"\n\nx.csv,\n', ['a.csv'])).toEqual([
      '2 good',
      '5 bad “x.csv” is not among the files chosen.',
    ]);
  });

  it('names the files that no line describes', () => {
    expect(checkLines('file\na.csv\n', known(['a.csv', 'b.csv'])).without).toEqual(['b.csv']);
  });

  it.each([
    ['', /empty/],
    ['title,note\nx,y\n', /one of them “file”/],
    ['file,title\n', /no line under/],
    ['file,title\na.csv,"never closed\n', /opens in line 2/],
  ])('refuses %j as a whole, in words', (csv, fault) => {
    expect(checkLines(csv, known(['a.csv'])).fault).toMatch(fault);
  });

  it(`takes ${MOST_LINES} lines and says so of one more`, () => {
    const table = (n: number) => `file\n${Array.from({ length: n }, (_, at) => `f${at}.csv`).join('\n')}\n`;
    const files = Array.from({ length: MOST_LINES }, (_, at) => `f${at}.csv`);
    expect(checkLines(table(MOST_LINES), known(files)).lines).toHaveLength(MOST_LINES);
    expect(checkLines(table(MOST_LINES + 1), known(files)).fault).toMatch(/5001 lines; 5000/);
  });
});
