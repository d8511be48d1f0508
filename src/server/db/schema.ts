/** Every table, one file an area; the migrations are generated from here. */
export * from './schema/captures.ts';
export * from './schema/jobs.ts';
export * from './schema/library.ts';
export * from './schema/owner.ts';
export * from './schema/path.ts';
export * from './schema/people.ts';
export * from './schema/teaching.ts';
export * from './schema/workshop.ts';
