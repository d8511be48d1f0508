import { type FormEvent, useState } from 'react';
import type { JobJson } from '../../contract/areas/jobs.ts';
import { ApiFailure, api, sentenceOf } from '../base/api.ts';
import { Button } from '../base/Button.tsx';
import { Dialog } from '../base/Dialog.tsx';
import { Field } from '../base/Field.tsx';
import { Message } from '../base/Message.tsx';
import { fieldErrors } from './field-errors.ts';
import { textOfVehicle, VehicleFields, vehicleOfText, vehicleProblems } from './VehicleFields.tsx';
import { codesOf } from './words.ts';

interface EditJobDialogProps {
  job: JobJson;
  onClose: () => void;
  onSaved: (job: JobJson) => void;
  onStale: () => void;
}

/** Complaint, vehicle and codes of a job. */
export function EditJobDialog({ job, onClose, onSaved, onStale }: EditJobDialogProps) {
  const [vehicle, setVehicle] = useState(textOfVehicle(job.vehicle));
  const [complaint, setComplaint] = useState(job.complaint);
  const [codes, setCodes] = useState(job.codes.join(' '));
  const [busy, setBusy] = useState(false);
  const [trouble, setTrouble] = useState<string | null>(null);
  const [errors, setErrors] = useState<Readonly<Record<string, string>>>({});

  const save = async (event: FormEvent) => {
    event.preventDefault();
    const problems = vehicleProblems(vehicle);
    if (complaint.trim() === '') return setErrors({ complaint: 'Say what the vehicle does or does not do' });
    if (Object.keys(problems).length > 0) return setErrors(problems);
    setBusy(true);
    setTrouble(null);
    setErrors({});
    try {
      const body = { complaint, codes: codesOf(codes), vehicle: vehicleOfText(vehicle) };
      const { data } = await api<JobJson>(`/jobs/${job.id}`, { method: 'PATCH', body, etag: job.etag });
      onSaved(data);
    } catch (thrown) {
      setErrors(fieldErrors(thrown));
      setTrouble(sentenceOf(thrown));
      if (thrown instanceof ApiFailure && thrown.status === 412) onStale();
      setBusy(false);
    }
  };
  return (
    <Dialog open title="Vehicle and complaint" onClose={onClose}>
      <form className="mt-3 grid gap-4" onSubmit={save} noValidate>
        <Field label="Complaint" error={errors.complaint ?? null}>
          <textarea
            className="box"
            maxLength={2000}
            value={complaint}
            onChange={(event) => setComplaint(event.target.value)}
          />
        </Field>
        <VehicleFields
          fields={vehicle}
          onChange={(change) => setVehicle((was) => ({ ...was, ...change }))}
          errors={errors}
        />
        <Field label="Trouble codes" help="Parted by spaces. Kept as typed.">
          <input
            className="box box-figures"
            autoCapitalize="characters"
            spellCheck={false}
            maxLength={500}
            value={codes}
            onChange={(event) => setCodes(event.target.value)}
          />
        </Field>
        {trouble !== null && (
          <Message
            verdict="bad"
            live="alert"
            title="The change was not kept"
            happened={trouble}
            kept="What you typed is still in the boxes; sending it again puts it over theirs."
          />
        )}
        <div className="flex justify-end gap-2">
          <Button onClick={onClose}>Cancel</Button>
          <Button type="submit" kind="main" busy={busy}>
            Keep
          </Button>
        </div>
      </form>
    </Dialog>
  );
}
