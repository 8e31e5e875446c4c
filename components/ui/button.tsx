import { cva, type VariantProps } from 'class-variance-authority';
import { Slot } from 'radix-ui';
import type { ComponentProps } from 'react';
import { cn } from './cn';

const buttonStyle = cva(
  'inline-flex items-center justify-center gap-2 rounded border font-medium whitespace-nowrap select-none transition-colors duration-100 disabled:cursor-not-allowed disabled:opacity-50 aria-disabled:cursor-not-allowed aria-disabled:opacity-50 [&_svg]:size-4 [&_svg]:shrink-0',
  {
    variants: {
      look: {
        filled: 'border-brass bg-brass text-on-brass enabled:hover:brightness-108',
        outline: 'border-edge bg-transparent text-ink enabled:hover:border-ink-2 enabled:hover:bg-raised',
        quiet: 'border-transparent bg-transparent text-ink-2 enabled:hover:bg-raised enabled:hover:text-ink',
        wrong: 'border-wrong bg-transparent text-wrong enabled:hover:bg-raised',
      },
      size: { medium: 'h-8 px-3.5 text-14 pointer-coarse:h-11', small: 'h-7 px-2.5 text-13 pointer-coarse:h-11' },
    },
    defaultVariants: { look: 'outline', size: 'medium' },
  },
);

export type ButtonProps = ComponentProps<'button'> & VariantProps<typeof buttonStyle> & { asChild?: boolean };

/** The one button family. A screen has at most one `filled`: the act it is there for. */
export function Button({ look, size, asChild = false, className, type, ...props }: ButtonProps) {
  const Tag = asChild ? Slot.Root : 'button';
  return (
    <Tag
      type={asChild ? undefined : (type ?? 'button')}
      className={cn(buttonStyle({ look, size }), className)}
      {...props}
    />
  );
}
