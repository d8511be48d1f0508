/** The capture was stopped, changed or removed since this attempt began: what it found is for nobody. */
export class Superseded extends Error {
  override readonly name = 'Superseded';
}
