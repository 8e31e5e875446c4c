'use client';

import { useRouter } from 'next/navigation';
import { useState, useTransition } from 'react';
import { toast } from 'sonner';
import { ConfirmDialog } from '@/components/forms/confirm-dialog';
import { Button } from '@/components/ui/button';
import { Menu, MenuItem } from '@/components/ui/menu';
import { Table, TableCell, TableHead, TableRow } from '@/components/ui/table';
import type { ActionResult } from '@/lib/rules/action-result';
import { ROLE_NAMES, type Role } from '@/lib/rules/roles';

export interface User {
  email: string;
  name: string;
  admin: boolean;
  state: 'active' | 'invited' | 'disabled';
  shows: { code: string; role: Role }[];
  tokens: number;
}

type Act<Input> = (input: Input) => Promise<ActionResult<unknown>>;

export interface UserActs {
  invite: Act<{ email: string }>;
  disable: Act<{ email: string }>;
  enable: Act<{ email: string }>;
  setAdmin: Act<{ email: string; admin: boolean }>;
}

const STATES = { active: '', invited: 'invited', disabled: 'may not sign in' } as const;

/** The studio's people. */
export function UserTable({ users, acts }: { users: readonly User[]; acts: UserActs }) {
  const router = useRouter();
  const [disabling, setDisabling] = useState<User | null>(null);
  const [busy, start] = useTransition();

  function run(act: () => Promise<ActionResult<unknown>>, done: string, after: () => void = () => undefined) {
    start(async () => {
      const result = await act();
      after();
      if (!result.ok) return void toast.error(result.message);
      toast(done);
      router.refresh();
    });
  }

  function actsOf(user: User) {
    const { email, name } = user;
    return (
      <>
        {user.state === 'invited' ? (
          <MenuItem onSelect={() => run(() => acts.invite({ email }), `A new invitation to ${email} is on its way`)}>
            Send the invitation again
          </MenuItem>
        ) : null}
        {user.state === 'disabled' ? (
          <MenuItem onSelect={() => run(() => acts.enable({ email }), `${name} may sign in again`)}>
            Let sign in again
          </MenuItem>
        ) : null}
        {user.state === 'disabled' ? null : user.admin ? (
          <MenuItem onSelect={() => run(() => acts.setAdmin({ email, admin: false }), `${name} is no admin any more`)}>
            No longer an admin
          </MenuItem>
        ) : (
          <MenuItem onSelect={() => run(() => acts.setAdmin({ email, admin: true }), `${name} is an admin now`)}>
            Make an admin
          </MenuItem>
        )}
        {user.state === 'disabled' ? null : <MenuItem onSelect={() => setDisabling(user)}>Disable</MenuItem>}
      </>
    );
  }

  return (
    <>
      <Table>
        <thead>
          <tr>
            <TableHead className="pl-4 md:pl-6">Person</TableHead>
            <TableHead>Shows</TableHead>
            <TableHead className="text-right">Tokens</TableHead>
            <TableHead>
              <span className="sr-only">Acts</span>
            </TableHead>
          </tr>
        </thead>
        <tbody>
          {users.map((user) => (
            <TableRow key={user.email}>
              <TableCell className="max-w-80 py-2 pl-4 md:pl-6">
                <span className={user.state === 'disabled' ? 'block truncate text-ink-3' : 'block truncate'}>
                  {user.name}
                  {user.admin ? <span className="ml-2 text-13 text-ink-2">Admin</span> : null}
                  {user.state === 'active' ? null : (
                    <span className="ml-2 text-13 text-ink-3">{STATES[user.state]}</span>
                  )}
                </span>
                <span className="block truncate text-13 text-ink-3">{user.email}</span>
              </TableCell>
              <TableCell className="max-w-96 truncate text-13 text-ink-2">
                {user.shows.map((show) => `${show.code} (${ROLE_NAMES[show.role]})`).join(', ') || (
                  <span className="text-ink-3">none</span>
                )}
              </TableCell>
              <TableCell className="text-right font-mono text-13 text-ink-2">{user.tokens}</TableCell>
              <TableCell className="pr-4 text-right md:pr-6">
                <Menu
                  trigger={
                    <Button size="small" look="quiet" disabled={busy} aria-label={`Change ${user.name}`}>
                      Change
                    </Button>
                  }
                >
                  {actsOf(user)}
                </Menu>
              </TableCell>
            </TableRow>
          ))}
        </tbody>
      </Table>
      {disabling === null ? null : (
        <ConfirmDialog
          open
          onOpenChange={() => setDisabling(null)}
          title={`Disable ${disabling.name}`}
          act="Disable"
          busy={busy}
          onConfirm={() =>
            run(
              () => acts.disable({ email: disabling.email }),
              `${disabling.name} may not sign in any more`,
              () => setDisabling(null),
            )
          }
        >
          Their sessions end at once and their tokens are refused. What they did stands under their name.
        </ConfirmDialog>
      )}
    </>
  );
}
