import { BLIND_CASES } from './cases/blind-cases.ts';
import { OWN_CASES } from './cases/own-cases.ts';
import { fixedOrder } from './cases/fixed-order.ts';
import { runCase } from './cases/run-case.ts';
for (const others of ['nothing','good'] as const) {
let right=0, lead=0;
for (const one0 of BLIND_CASES) { const one={...one0, others}; const end = runCase(one); const ok = end.shown===one.cause; if(ok) right++; if (ok||(!end.shown&&end.leading===one.cause)) lead++; console.log(ok?'ok ': end.shown? 'WRONG' : end.leading===one.cause?'lead':'MISS', one.name, one.cause, '->', end.shown, end.leading, end.share.toFixed(2), end.minutes, end.asked.length, ok?'':'\n    '+end.asked.join(' ')+ end.contradictions.join(' | ')); }
console.log(others, right, lead, BLIND_CASES.length);
}
let right=0; for (const one of OWN_CASES) if (runCase(one).shown===one.cause) right++; else console.log('own BAD', one.name);
console.log(right);
const all=[...OWN_CASES,...BLIND_CASES];
const mean=(a:number[])=>a.reduce((x,y)=>x+y,0)/a.length;
console.log('best', mean(all.map(c=>runCase(c).minutes)), 'fixed', mean(all.map(c=>runCase(c,fixedOrder).minutes)));
