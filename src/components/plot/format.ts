export * from '../../engine/drawing/format.ts';
