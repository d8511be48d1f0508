import type { Findings, Wheel } from '../capture.ts';
import type { CamEdges } from '../circuits/cam.ts';
import { absent, type Notice, type Value } from '../value.ts';
import { crankAngleAt, longestStretch } from './crank-angle.ts';

const CYCLE = 720;
/** Edges further apart than this are different edges of the cam. */
const APART = 8;
/** An edge must come back in this share of the cycles it could be seen in. */
const SHARE = 0.6;

interface Cluster {
  /** Circular mean, 0 to 720. */
  readonly angle: number;
  /** Deviations from the mean, degrees. */
  readonly off: readonly number[];
  readonly timesS: readonly number[];
}

/**
 * Cam edges in crank degrees over 720 (circular mean over the cycles). 0 is that one of the two reference marks after
 * which the first rising cam edge comes sooner.
 */
export function camAngles(wheel: Wheel, edges: CamEdges): Findings {
  const stretch = longestStretch(wheel);
  const cycles = Math.floor((stretch.degrees + 1e-6) / CYCLE);
  if (cycles < 1)
    return {
      values: none('less than one complete cycle (720 degrees) of the crank is in the capture'),
      notices: [],
    };
  const rising = edges.risingS ? clustersOf(wheel, edges.risingS, stretch, cycles) : [];
  const falling = edges.fallingS ? clustersOf(wheel, edges.fallingS, stretch, cycles) : [];
  if (rising === null || falling === null) {
    return {
      values: none('the cam edges do not come back at the same crank angles'),
      notices: [strayNotice(stretch)],
    };
  }
  if (rising.length + falling.length === 0)
    return { values: none('no cam edge within the turns of the crank'), notices: [] };
  const zero = zeroMark(rising.length > 0 ? rising : falling);
  const all = [{ from: stretch.fromS, to: stretch.toS }];
  const oneSided = 'a two-wire cam sensor has one event a lobe, on the other side';
  return {
    values: [
      edges.risingS
        ? angleValue('cam_rising_angles', rising, zero)
        : absent('cam_rising_angles', 'deg', oneSided),
      edges.fallingS
        ? angleValue('cam_falling_angles', falling, zero)
        : absent('cam_falling_angles', 'deg', oneSided),
      { key: 'edges_per_cycle', value: rising.length + falling.length, unit: '1', n: cycles, evidence: all },
    ],
    notices: [],
  };
}

const none = (reason: string): Value[] => [
  absent('cam_rising_angles', 'deg', reason),
  absent('cam_falling_angles', 'deg', reason),
  absent('edges_per_cycle', '1', reason),
];

/** Edges gathered by angle over 720; null when too many come back in too few cycles. */
function clustersOf(
  wheel: Wheel,
  timesS: Float64Array,
  stretch: { fromS: number; toS: number },
  cycles: number,
): Cluster[] | null {
  const edges: Array<{ angle: number; timeS: number }> = [];
  for (const timeS of timesS) {
    if (timeS < stretch.fromS || timeS > stretch.toS) continue;
    const degrees = crankAngleAt(wheel, timeS);
    if (degrees !== null) edges.push({ angle: ((degrees % CYCLE) + CYCLE) % CYCLE, timeS });
  }
  if (edges.length === 0) return [];
  edges.sort((a, b) => a.angle - b.angle);
  const groups: Array<typeof edges> = [];
  for (const edge of edges) {
    const group = groups.at(-1);
    if (group && edge.angle - group.at(-1)!.angle < APART) group.push(edge);
    else groups.push([edge]);
  }
  const last = groups.at(-1)!;
  if (groups.length > 1 && groups[0]![0]!.angle + CYCLE - last.at(-1)!.angle < APART) {
    groups[0] = [...last.map((edge) => ({ ...edge, angle: edge.angle - CYCLE })), ...groups[0]!];
    groups.pop();
  }
  const kept = groups.filter((group) => group.length >= Math.max(1, SHARE * cycles));
  const strays = edges.length - kept.reduce((sum, group) => sum + group.length, 0);
  if (strays > 0.25 * edges.length) return null;
  return kept.map((group) => {
    const mean = group.reduce((sum, edge) => sum + edge.angle, 0) / group.length;
    return {
      angle: ((mean % CYCLE) + CYCLE) % CYCLE,
      off: group.map((edge) => edge.angle - mean),
      timesS: group.map((edge) => edge.timeS).sort((a, b) => a - b),
    };
  });
}

function zeroMark(clusters: readonly Cluster[]): number {
  const first = (zero: number) =>
    Math.min(...clusters.map((c) => (((c.angle - zero) % CYCLE) + CYCLE) % CYCLE));
  return first(360) < first(0) - 1e-9 ? 360 : 0;
}

function angleValue(key: string, clusters: readonly Cluster[], zero: number): Value {
  if (clusters.length === 0) return absent(key, 'deg', 'no such cam edge within the turns of the crank');
  const list = clusters
    .map((cluster) => ({ ...cluster, angle: (((cluster.angle - zero) % CYCLE) + CYCLE) % CYCLE }))
    .sort((a, b) => a.angle - b.angle);
  const each = Math.max(1, Math.floor(50 / list.length));
  return {
    key,
    value: list.map((cluster) => cluster.angle),
    unit: 'deg',
    n: Math.min(...list.map((cluster) => cluster.off.length)),
    min: list.map((cluster) => cluster.angle + Math.min(...cluster.off)),
    max: list.map((cluster) => cluster.angle + Math.max(...cluster.off)),
    sd: list.map(({ off }) =>
      off.length > 1 ? Math.sqrt(off.reduce((sum, value) => sum + value * value, 0) / (off.length - 1)) : 0,
    ),
    evidence: list.flatMap(({ timesS }) => timesS.slice(0, each).map((time) => ({ from: time, to: time }))),
  };
}

function strayNotice(stretch: { fromS: number; toS: number }): Notice {
  return {
    code: 'cam-out-of-step',
    severity: 'watch',
    text: 'The cam edges do not come back at the same crank angles. Usual causes: disturbance on one of the two signals, a belt or chain that jumps, or a signal that is no cam of this engine. The two traces alone do not tell which: look at both, and compare with a known-good.',
    evidence: [{ from: stretch.fromS, to: stretch.toS }],
  };
}
