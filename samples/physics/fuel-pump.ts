/**
 * Current of a pump's direct-current motor: its commutator lets it rise and fall once a bar, each bar a little differently.
 * `bars` are the shares of the ripple that each bar makes; a worn or open one makes less.
 */
export function pumpAmperes(
  timeS: number,
  pump: {
    readonly meanA: number;
    readonly rippleA: number;
    readonly rpm: number;
    readonly bars: readonly number[];
  },
): number {
  const phase = (pump.rpm / 60) * pump.bars.length * timeS;
  const bar = Math.floor(phase);
  const share = pump.bars[bar % pump.bars.length] ?? 1;
  return pump.meanA + pump.rippleA * share * (Math.abs(Math.sin(Math.PI * (phase - bar))) - 2 / Math.PI);
}
