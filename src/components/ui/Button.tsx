import type { AnchorHTMLAttributes, ButtonHTMLAttributes, ReactNode } from 'react';
import { classes } from './classes.ts';

export type ButtonLook = 'plain' | 'primary' | 'quiet';

interface Looks {
  readonly look?: ButtonLook;
  readonly small?: boolean;
  readonly className?: string;
}

type ButtonProps = Looks &
  Omit<ButtonHTMLAttributes<HTMLButtonElement>, 'style'> & {
    /** Work is under way: the button stays focusable, says so and does not act twice. */
    readonly busy?: boolean;
    readonly busyLabel?: string;
  };

/** A button says what happens. One primary button on a panel. */
export function Button({ look, small, className, busy, busyLabel, children, ...rest }: ButtonProps) {
  return (
    <button
      type="button"
      {...rest}
      className={looks({ look, small, className })}
      aria-disabled={busy || rest['aria-disabled'] || undefined}
      onClick={busy ? (event) => event.preventDefault() : rest.onClick}
    >
      {busy ? (busyLabel ?? children) : children}
    </button>
  );
}

type LinkButtonProps = Looks &
  Omit<AnchorHTMLAttributes<HTMLAnchorElement>, 'style'> & {
    readonly href: string;
    readonly children: ReactNode;
  };

/** A link that looks like a button: it leads somewhere and changes nothing. */
export function LinkButton({ look, small, className, children, ...rest }: LinkButtonProps) {
  return (
    <a {...rest} className={looks({ look, small, className })}>
      {children}
    </a>
  );
}

function looks({ look = 'plain', small, className }: Looks): string {
  return classes('button', look !== 'plain' && `button-${look}`, small && 'button-small', className);
}
