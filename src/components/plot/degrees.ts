export * from '../../engine/drawing/degrees.ts';
