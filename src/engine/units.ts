/**
 * Coordinate spaces that must not be mixed up, as branded numbers: they cost nothing at run time.
 * Times are seconds of the capture's own axis, degrees are crank degrees after the reference mark.
 */
declare const brand: unique symbol;
type Branded<Name extends string> = number & { readonly [brand]: Name };

export type Seconds = Branded<'Seconds'>;
export type SampleIndex = Branded<'SampleIndex'>;
export type CrankDegrees = Branded<'CrankDegrees'>;
export type Pixels = Branded<'Pixels'>;

export const seconds = (value: number) => value as Seconds;
export const sampleIndex = (value: number) => value as SampleIndex;
export const crankDegrees = (value: number) => value as CrankDegrees;
export const pixels = (value: number) => value as Pixels;
