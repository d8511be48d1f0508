export * from '../../engine/drawing/line-data.ts';
