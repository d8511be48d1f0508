import type { PlotWheel } from '../drawing/types.ts';

/** For tests: an N-minus-M wheel that turns evenly, complete turns from `firstMarkS` on. */
export function evenWheel({
  rpm = 200,
  turns = 3,
  firstMarkS = 0,
  places = 60,
  missing = 2,
} = {}): PlotWheel {
  const turnS = 60 / rpm;
  const marksS = Array.from({ length: turns + 1 }, (_, turn) => firstMarkS + turn * turnS);
  const teethS: number[] = [];
  const teethDeg: number[] = [];
  for (let turn = 0; turn < turns; turn += 1) {
    for (let tooth = 0; tooth < places - missing; tooth += 1) {
      teethS.push(firstMarkS + (turn + tooth / places) * turnS);
      teethDeg.push(360 * (turn + tooth / places));
    }
  }
  teethS.push(firstMarkS + turns * turnS);
  teethDeg.push(360 * turns);
  return { places, teethPerTurn: places - missing, marksS, teethS, teethDeg };
}
