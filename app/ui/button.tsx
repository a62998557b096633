import type { ButtonHTMLAttributes, ReactNode, Ref } from 'react';
import { Link } from 'react-router-dom';
import { classNames } from './class-names.ts';

/** primary: the one main act of a screen. second: a hairline box. quiet: underlined words. grave: heavy ink, for what cannot be undone. */
export type ButtonKind = 'primary' | 'second' | 'quiet' | 'grave';

const KINDS: Record<ButtonKind, string> = { primary: 'btn', second: 'btn2', quiet: 'lk', grave: 'btn2 grave' };

interface Look {
  readonly kind?: ButtonKind;
  /** Small words, for quiet buttons and links within facts. */
  readonly small?: boolean;
  /** As wide as the column on a phone. */
  readonly wide?: boolean;
}

function lookOf({ kind = 'second', small, wide }: Look, more?: string): string {
  return classNames(KINDS[kind], small && kind === 'quiet' && 's', wide && 'wide-s', more);
}

export interface ButtonProps extends Look, ButtonHTMLAttributes<HTMLButtonElement> {
  /** Under way: cannot be pressed again, keeps its focus, and says so. */
  readonly busy?: boolean;
  readonly ref?: Ref<HTMLButtonElement>;
}

/** A button; `type` is `button` unless said otherwise. */
export function Button({ kind, small, wide, busy, className, type = 'button', onClick, ...rest }: ButtonProps) {
  return (
    <button
      {...rest}
      type={busy && type === 'submit' ? 'button' : type}
      aria-busy={busy || undefined}
      aria-disabled={busy || rest['aria-disabled']}
      onClick={busy ? undefined : onClick}
      className={lookOf({ kind, small, wide }, className)}
    />
  );
}

export interface LinkButtonProps extends Look {
  readonly to: string;
  readonly children: ReactNode;
  readonly className?: string;
  readonly replace?: boolean;
}

/** A link that looks like a button, or a quiet one in the text. */
export function LinkButton({ kind = 'quiet', small, wide, className, ...rest }: LinkButtonProps) {
  return <Link {...rest} className={lookOf({ kind, small, wide }, className)} />;
}
