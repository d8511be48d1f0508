import { describe, expect, it } from 'vitest';
import { numbersCsv } from './numbers-csv.ts';

describe('numbersCsv()', () => {
  it('writes each number, each part of a list, and why one is missing; a formula in a name stays text', () => {
    const text = numbersCsv(
      {
        signals: [
          {
            index: 0,
            column: 1,
            name: '=cmd()',
            circuit: 'other',
            circuitConfidence: 1,
            circuitBecause: '',
            unit: 'V',
            factor: 1,
            offset: 0,
            made: null,
          },
        ],
      },
      {
        capture: 'c',
        revision: 1,
        engine: '1',
        stale: false,
        relations: [],
        signals: [
          {
            index: 0,
            circuit: 'other',
            notices: [],
            values: [
              {
                key: 'dwell',
                value: 4.58,
                unit: 'ms',
                n: 11,
                min: 4.51,
                max: 4.66,
                evidence: [{ from: 0.1, to: 0.2 }],
              },
              { key: 'angles', value: [57, null], unit: 'deg', min: [56, 0], evidence: [] },
              {
                key: 'burn_time',
                value: null,
                unit: 'ms',
                reason: 'no burn line, or too short',
                evidence: [],
              },
            ],
          },
        ],
      },
    );
    expect(text.split('\n')).toEqual([
      'signal,key,part,value,unit,n,min,max,sd,reason,from_s,to_s',
      "'=cmd(),dwell,,4.58,ms,11,4.51,4.66,,,0.1,0.2",
      "'=cmd(),angles,1,57,deg,,56,,,,,",
      "'=cmd(),angles,2,,deg,,0,,,,,",
      '\'=cmd(),burn_time,,,ms,,,,,"no burn line, or too short",,',
      '',
    ]);
  });
});
