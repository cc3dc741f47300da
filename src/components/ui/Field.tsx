import {
  useId,
  type InputHTMLAttributes,
  type ReactNode,
  type SelectHTMLAttributes,
  type TextareaHTMLAttributes,
} from 'react';
import { classes } from './classes.ts';

interface Wired {
  readonly id: string;
  readonly 'aria-describedby': string | undefined;
  readonly 'aria-invalid': true | undefined;
}

interface FieldFrameProps {
  readonly label: ReactNode;
  readonly hint?: ReactNode;
  readonly error?: ReactNode;
  readonly className?: string;
  readonly children: (wired: Wired) => ReactNode;
}

/** Label, hint and error wired to one control, so that no screen can forget. */
export function FieldFrame({ label, hint, error, className, children }: FieldFrameProps) {
  const id = useId();
  const described = [hint && `${id}-hint`, error && `${id}-error`].filter(Boolean).join(' ');
  return (
    <div className={classes('field', className)}>
      <label className="field-label" htmlFor={id}>
        {label}
      </label>
      {hint && (
        <p className="field-hint" id={`${id}-hint`}>
          {hint}
        </p>
      )}
      {children({
        id,
        'aria-describedby': described || undefined,
        'aria-invalid': error ? true : undefined,
      })}
      {error && <FieldErrorText id={`${id}-error`}>{error}</FieldErrorText>}
    </div>
  );
}

/** An error of one field: a mark, the word and what to do. */
export function FieldErrorText({ id, children }: { readonly id: string; readonly children: ReactNode }) {
  return (
    <p className="field-error" id={id}>
      <span aria-hidden="true">↑ </span>
      {children}
    </p>
  );
}

type Labelled = Omit<FieldFrameProps, 'children' | 'className'> & { readonly fieldClassName?: string };

export type FieldProps = Labelled & Omit<InputHTMLAttributes<HTMLInputElement>, 'style' | 'id'>;

export function Field({ label, hint, error, fieldClassName, className, ...rest }: FieldProps) {
  return (
    <FieldFrame label={label} hint={hint} error={error} className={fieldClassName}>
      {(wired) => <input {...rest} {...wired} className={classes('input', className)} />}
    </FieldFrame>
  );
}

export type TextAreaProps = Labelled & Omit<TextareaHTMLAttributes<HTMLTextAreaElement>, 'style' | 'id'>;

export function TextArea({ label, hint, error, fieldClassName, className, ...rest }: TextAreaProps) {
  return (
    <FieldFrame label={label} hint={hint} error={error} className={fieldClassName}>
      {(wired) => <textarea {...rest} {...wired} className={classes('input', className)} />}
    </FieldFrame>
  );
}

export interface Choice {
  readonly value: string;
  readonly label: string;
  readonly hint?: string;
  readonly disabled?: boolean;
}

export type SelectProps = Labelled &
  Omit<SelectHTMLAttributes<HTMLSelectElement>, 'style' | 'id' | 'children'> & {
    readonly options: readonly Choice[];
    /** Shown first with an empty value, where nothing may be preselected. */
    readonly placeholder?: string;
  };

export function Select({
  label,
  hint,
  error,
  fieldClassName,
  className,
  options,
  placeholder,
  ...rest
}: SelectProps) {
  return (
    <FieldFrame label={label} hint={hint} error={error} className={fieldClassName}>
      {(wired) => (
        <select {...rest} {...wired} className={classes('input', className)}>
          {placeholder !== undefined && <option value="">{placeholder}</option>}
          {options.map((option) => (
            <option key={option.value} value={option.value} disabled={option.disabled}>
              {option.label}
            </option>
          ))}
        </select>
      )}
    </FieldFrame>
  );
}
