import { clsx } from 'clsx';
import type { ButtonHTMLAttributes, ReactNode } from 'react';
import { Link } from 'react-router-dom';
import type { LinkProps } from 'react-router-dom';

export type ButtonLook = 'solid' | 'outline' | 'plain' | 'danger';
export type ButtonSize = 'normal' | 'small' | 'bench';

const looks: Record<ButtonLook, string> = {
  solid: 'border-spruce bg-spruce text-on-spruce hover:border-spruce-deep hover:bg-spruce-deep',
  outline: 'border-spruce bg-card text-spruce hover:bg-wash',
  plain: 'border-transparent text-spruce underline decoration-2 underline-offset-4 hover:bg-wash',
  danger: 'border-brick bg-card text-brick hover:bg-brick-wash',
};

const sizes: Record<ButtonSize, string> = {
  small: 'min-h-11 px-3 text-small sm:min-h-9',
  normal: 'min-h-11 px-4',
  bench: 'min-h-14 px-6 text-lead',
};

function buttonClass(look: ButtonLook, size: ButtonSize, className?: string): string {
  return clsx(
    'inline-flex items-center justify-center gap-2 rounded-control border-2 text-center leading-tight font-heavy no-underline transition-colors duration-150',
    'disabled:cursor-not-allowed disabled:border-soft disabled:bg-transparent disabled:text-soft',
    'aria-disabled:cursor-progress',
    looks[look],
    sizes[size],
    className,
  );
}

export interface ButtonProps extends ButtonHTMLAttributes<HTMLButtonElement> {
  look?: ButtonLook;
  size?: ButtonSize;
  /** While true the button keeps its place and says what is going on, and does nothing. */
  busy?: boolean;
  busyWords?: string;
  children: ReactNode;
}

export function Button(props: ButtonProps) {
  const { look = 'solid', size = 'normal', busy = false, busyWords, className, ...rest } = props;
  return (
    <button
      type="button"
      {...rest}
      aria-disabled={busy || undefined}
      onClick={busy ? (event) => event.preventDefault() : rest.onClick}
      className={buttonClass(look, size, className)}
    >
      {busy && busyWords !== undefined ? busyWords : rest.children}
    </button>
  );
}

export interface ButtonLinkProps extends LinkProps {
  look?: ButtonLook;
  size?: ButtonSize;
}

export function ButtonLink({
  look = 'solid',
  size = 'normal',
  className,
  ...rest
}: ButtonLinkProps) {
  return <Link {...rest} className={buttonClass(look, size, className)} />;
}

/** For addresses outside the client's own pages: the payment page, a PDF. */
export function ButtonAnchor(props: {
  href: string;
  look?: ButtonLook;
  size?: ButtonSize;
  children: ReactNode;
}) {
  return (
    <a href={props.href} className={buttonClass(props.look ?? 'solid', props.size ?? 'normal')}>
      {props.children}
    </a>
  );
}
