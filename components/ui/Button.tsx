import Link from 'next/link';
import type { ButtonHTMLAttributes, ComponentProps } from 'react';

/**
 * `first`: filled ink, one per view part. `plain`: ink outline. `final`: madder,
 * cannot be undone. `held`: dashed, held back.
 */
export type ButtonLook = 'first' | 'plain' | 'quiet' | 'final' | 'held';
/** `lane` 28 px high, `normal` 32, `tall` 46; on phones every one of them is 44 or more. */
export type ButtonSize = 'lane' | 'normal' | 'tall';

const LOOKS: Record<ButtonLook, string> = {
  first: 'border-ink bg-ink text-on hover:border-ink2 hover:bg-ink2',
  plain: 'border-ink bg-lit text-ink hover:bg-desk',
  quiet: 'border-ink3 bg-transparent text-ink hover:bg-desk',
  final: 'border-madder bg-lit text-madder hover:bg-desk',
  held: 'border-dashed border-ink3 bg-transparent text-ink2',
};

const SIZES: Record<ButtonSize, string> = {
  lane: 'min-h-11 px-4 strip:min-h-7 strip:px-[13px]',
  normal: 'min-h-11 px-4 strip:min-h-8 strip:px-[14px]',
  tall: 'min-h-[46px] px-5',
};

export const buttonClass = (look: ButtonLook, size: ButtonSize, more = '') =>
  `type-button max-strip:text-[0.84375rem] inline-flex shrink-0 items-center justify-center whitespace-nowrap rounded border-[1.5px] text-center no-underline transition-colors duration-100 ${LOOKS[look]} ${SIZES[size]} ${more}`;

/** For a button that says a name of any length: it breaks in lines. */
export const ANY_LENGTH = 'max-w-full shrink! whitespace-normal! text-left! py-1.5 [overflow-wrap:anywhere]';

interface Looks {
  look?: ButtonLook;
  size?: ButtonSize;
}

export function Button({ look = 'plain', size = 'normal', className, type = 'button', disabled, ...rest }: Looks & ButtonHTMLAttributes<HTMLButtonElement>) {
  return <button type={type} disabled={disabled} className={buttonClass(disabled ? 'held' : look, size, className)} {...rest} />;
}

export function LinkButton({ look = 'plain', size = 'normal', className, ...rest }: Looks & ComponentProps<typeof Link>) {
  return <Link className={buttonClass(look, size, className)} {...rest} />;
}
