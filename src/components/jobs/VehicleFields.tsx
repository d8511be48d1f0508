import { vinWarning } from '../../engine/vehicle/vin.ts';
import { Field } from '../base/Field.tsx';
import { Verdict } from '../base/Verdict.tsx';
import type { Vehicle } from './words.ts';

/** A vehicle as it is typed: all text. */
export const EMPTY_VEHICLE = {
  make: '',
  model: '',
  year: '',
  engine: '',
  cylinders: '',
  plate: '',
  vin: '',
};
export type VehicleText = typeof EMPTY_VEHICLE;

export const textOfVehicle = (vehicle: Vehicle): VehicleText => ({
  ...vehicle,
  year: vehicle.year === null ? '' : String(vehicle.year),
  cylinders: vehicle.cylinders === null ? '' : String(vehicle.cylinders),
});

const count = (text: string): number | null => (/^\d+$/.test(text.trim()) ? Number(text) : null);

/** For the API. What is no number is left out; the fields take digits only. */
export const vehicleOfText = (text: VehicleText): Vehicle => ({
  ...text,
  year: count(text.year),
  cylinders: count(text.cylinders),
});

/** What cannot be sent as it is typed, by the server's names of the fields. */
export function vehicleProblems(text: VehicleText): Readonly<Record<string, string>> {
  const wrong = (['year', 'cylinders'] as const).filter(
    (name) => text[name].trim() !== '' && count(text[name]) === null,
  );
  return Object.fromEntries(wrong.map((name) => [`vehicle.${name}`, 'A whole number, or empty']));
}

interface VehicleFieldsProps {
  fields: VehicleText;
  onChange: (change: Partial<VehicleText>) => void;
  errors: Readonly<Record<string, string>>;
}

export function VehicleFields({ fields, onChange, errors }: VehicleFieldsProps) {
  const warning = vinWarning(fields.vin.trim());
  const box = (name: keyof VehicleText, extra: Readonly<Record<string, unknown>> = {}) => (
    <input
      className="box"
      maxLength={80}
      autoComplete="off"
      value={fields[name]}
      onChange={(event) => onChange({ [name]: event.target.value })}
      {...extra}
    />
  );
  const digits = { inputMode: 'numeric', maxLength: 4, className: 'box box-figures' };
  const plain = { className: 'box box-figures uppercase', autoCapitalize: 'characters', spellCheck: false };
  return (
    <div className="grid grid-cols-2 gap-4 desk:grid-cols-4">
      <Field label="Make" error={errors['vehicle.make'] ?? null}>
        {box('make')}
      </Field>
      <Field label="Model" error={errors['vehicle.model'] ?? null}>
        {box('model')}
      </Field>
      <Field label="Year" error={errors['vehicle.year'] ?? null}>
        {box('year', digits)}
      </Field>
      <Field label="Cylinders" error={errors['vehicle.cylinders'] ?? null}>
        {box('cylinders', { ...digits, maxLength: 2 })}
      </Field>
      <div className="col-span-2 grid desk:col-span-4">
        <Field label="Engine" help="Code, fuel, injection" error={errors['vehicle.engine'] ?? null}>
          {box('engine', { maxLength: 120 })}
        </Field>
      </div>
      <div className="col-span-2 grid content-start">
        <Field label="Plate" error={errors['vehicle.plate'] ?? null}>
          {box('plate', { ...plain, maxLength: 20 })}
        </Field>
      </div>
      <div className="col-span-2 grid content-start gap-1.5">
        <Field label="VIN" error={errors['vehicle.vin'] ?? null}>
          {box('vin', { ...plain, maxLength: 40 })}
        </Field>
        <p role="status" className="text-dense">
          {warning !== null && <Verdict verdict="watch" word={warning} />}
        </p>
      </div>
    </div>
  );
}
