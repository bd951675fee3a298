import { useId } from 'react';

/** A row of radios in a fieldset. */
export function Choices<T extends string>(props: {
  legend: string;
  options: readonly T[];
  labels: Readonly<Record<T, string>>;
  value: T;
  onChange: (value: T) => void;
}) {
  const name = useId();
  return (
    <fieldset className="min-w-0">
      <legend className="field-label">{props.legend}</legend>
      <div className="choices">
        {props.options.map((option) => (
          <label className="choice" key={option}>
            <input
              type="radio"
              name={name}
              value={option}
              checked={props.value === option}
              onChange={() => props.onChange(option)}
            />
            {props.labels[option]}
          </label>
        ))}
      </div>
    </fieldset>
  );
}
