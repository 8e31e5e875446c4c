import type { ComponentProps } from 'react';
import { cn } from './cn';
import { Tooltip } from './tooltip';

type IconButtonProps = ComponentProps<'button'> & { label: string; shortcut?: string };

/** A button that shows an icon alone; the label is its accessible name and its tooltip. */
export function IconButton({ label, shortcut, className, type = 'button', ...props }: IconButtonProps) {
  return (
    <Tooltip label={label} shortcut={shortcut}>
      <button
        type={type}
        aria-label={label}
        className={cn(
          'inline-flex size-8 items-center justify-center rounded text-ink-2 transition-colors duration-100 enabled:hover:bg-raised enabled:hover:text-ink disabled:cursor-not-allowed disabled:opacity-50 aria-pressed:text-brass pointer-coarse:size-11 [&_svg]:size-4',
          className,
        )}
        {...props}
      />
    </Tooltip>
  );
}
