export * from '../../engine/drawing/time-scale.ts';
