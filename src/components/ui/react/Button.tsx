import type { ButtonHTMLAttributes } from 'react';
import { type ButtonKind, buttonClass } from '../button';

interface ButtonProps extends ButtonHTMLAttributes<HTMLButtonElement> {
  kind?: ButtonKind;
  block?: boolean;
}

/** React twin of Button.astro. `type` is "button" unless said otherwise. */
export function Button({ kind = 'plain', block = false, className, type = 'button', ...rest }: ButtonProps) {
  return <button type={type} className={buttonClass(kind, block, className)} {...rest} />;
}
