'use client';

import { UserRound } from 'lucide-react';
import Link from 'next/link';
import { Menu, MenuChoice, MenuItem, MenuNote, MenuRule } from '@/components/ui/menu';
import { useTheme } from '@/hooks/use-theme';
import type { Theme } from '@/lib/rules/themes';

const THEME_OPTIONS: readonly { value: Theme; label: string }[] = [
  { value: 'dark', label: 'Dark' },
  { value: 'light', label: 'Light' },
  { value: 'system', label: 'As the system' },
];

interface AccountMenuProps {
  name: string;
  email: string;
  /** Pages of the account that exist. */
  links?: readonly { href: string; label: string }[];
  onSignOut: () => void;
}

/** Who is signed in, the theme, and the way out. */
export function AccountMenu({ name, email, links = [], onSignOut }: AccountMenuProps) {
  const [theme, setTheme] = useTheme();
  return (
    <Menu
      trigger={
        <button
          type="button"
          aria-label={`Account of ${name}`}
          className="inline-flex h-8 max-w-48 items-center gap-2 rounded px-1.5 text-14 text-ink-2 hover:text-ink pointer-coarse:h-11"
        >
          <span className="truncate max-sm:hidden">{name}</span>
          <UserRound aria-hidden className="size-5 sm:hidden" />
        </button>
      }
    >
      <MenuNote>
        <span className="block text-14 text-ink">{name}</span>
        {email}
      </MenuNote>
      <MenuRule />
      <MenuChoice label="Theme" value={theme} onValueChange={setTheme} options={THEME_OPTIONS} />
      <MenuRule />
      {links.map((link) => (
        <MenuItem key={link.href} asChild>
          <Link href={link.href}>{link.label}</Link>
        </MenuItem>
      ))}
      <MenuItem onSelect={onSignOut}>Sign out</MenuItem>
    </Menu>
  );
}
