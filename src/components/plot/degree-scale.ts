export * from '../../engine/drawing/degree-scale.ts';
