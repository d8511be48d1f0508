export * from '../../engine/testing/even-wheel.ts';
