import type { ButtonHTMLAttributes } from 'react';
import { Icon, type IconName } from './Icon.tsx';
import { Mark } from './Mark.tsx';

export type ButtonKind = 'plain' | 'main' | 'bad' | 'watch' | 'quiet';

export const buttonClass = (kind: ButtonKind = 'plain', small = false, extra = '') =>
  ['button', kind === 'plain' ? '' : `button-${kind}`, small ? 'button-small' : '', extra]
    .filter((name) => name !== '')
    .join(' ');

interface ButtonProps extends ButtonHTMLAttributes<HTMLButtonElement> {
  kind?: ButtonKind;
  small?: boolean;
  icon?: IconName;
  /** At work: shows the turning mark, says so, and takes no second press. */
  busy?: boolean;
}

export function Button({
  kind,
  small,
  icon,
  busy = false,
  className,
  children,
  onClick,
  ...rest
}: ButtonProps) {
  return (
    <button
      type="button"
      {...rest}
      className={buttonClass(kind, small, className)}
      aria-busy={busy ? true : undefined}
      onClick={busy ? undefined : onClick}
    >
      {busy ? <Mark size={18} turning /> : icon !== undefined && <Icon name={icon} small={small ?? false} />}
      {children}
    </button>
  );
}
