import type { ComponentProps, ReactElement } from 'react';
import { type ButtonVariant, buttonLook } from './look';

type Props = ComponentProps<'button'> & { variant?: ButtonVariant };

/** A button in an island. `type` is `button` when left out: an island's buttons seldom submit. */
export function Button({ variant = 'main', className = '', type = 'button', ...rest }: Props): ReactElement {
  return <button type={type} className={`${buttonLook(variant)} ${className}`} {...rest} />;
}
