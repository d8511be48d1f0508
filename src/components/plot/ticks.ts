export * from '../../engine/drawing/ticks.ts';
