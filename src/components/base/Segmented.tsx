interface SegmentedProps<T extends string> {
  label: string;
  options: readonly { readonly value: T; readonly text: string }[];
  value: T;
  onChange: (value: T) => void;
}

/** A few choices of which one holds: a row of toggle buttons. */
export function Segmented<T extends string>({ label, options, value, onChange }: SegmentedProps<T>) {
  return (
    // biome-ignore lint/a11y/useSemanticElements: a fieldset cannot be a flex row in every browser
    <div className="segmented" role="group" aria-label={label}>
      {options.map((option) => (
        <button
          key={option.value}
          type="button"
          aria-pressed={option.value === value}
          onClick={() => onChange(option.value)}
        >
          {option.text}
        </button>
      ))}
    </div>
  );
}
