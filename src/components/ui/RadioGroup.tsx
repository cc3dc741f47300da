import { useId, type ReactNode } from 'react';
import { FieldErrorText, type Choice } from './Field.tsx';

interface RadioGroupProps {
  readonly legend: ReactNode;
  readonly name: string;
  readonly options: readonly Choice[];
  /** Null is nothing chosen; nothing is preselected by itself. */
  readonly value?: string | null;
  readonly defaultValue?: string;
  readonly onChange?: (value: string) => void;
  readonly hint?: ReactNode;
  readonly error?: ReactNode;
  readonly required?: boolean;
  readonly disabled?: boolean;
}

export function RadioGroup(props: RadioGroupProps) {
  const { legend, name, options, value, defaultValue, onChange, hint, error, required, disabled } = props;
  const id = useId();
  const described = [hint && `${id}-hint`, error && `${id}-error`].filter(Boolean).join(' ');
  const controlled = value !== undefined;
  return (
    <fieldset className="field" disabled={disabled} aria-describedby={described || undefined}>
      <legend className="field-label">{legend}</legend>
      {hint && (
        <p className="field-hint" id={`${id}-hint`}>
          {hint}
        </p>
      )}
      {options.map((option) => (
        <label key={option.value} className="choice">
          <input
            type="radio"
            name={name}
            value={option.value}
            required={required}
            disabled={option.disabled}
            {...(controlled
              ? { checked: value === option.value }
              : { defaultChecked: defaultValue === option.value })}
            onChange={() => onChange?.(option.value)}
          />
          <span>
            {option.label}
            {option.hint && <span className="field-hint block">{option.hint}</span>}
          </span>
        </label>
      ))}
      {error && <FieldErrorText id={`${id}-error`}>{error}</FieldErrorText>}
    </fieldset>
  );
}
