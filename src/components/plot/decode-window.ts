export * from '../../engine/drawing/decode-window.ts';
