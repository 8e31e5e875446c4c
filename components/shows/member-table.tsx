'use client';

import { useRouter } from 'next/navigation';
import { useState, useTransition } from 'react';
import { toast } from 'sonner';
import { ConfirmDialog } from '@/components/forms/confirm-dialog';
import { Button } from '@/components/ui/button';
import { Select } from '@/components/ui/select';
import { Table, TableCell, TableHead, TableRow } from '@/components/ui/table';
import type { ActionResult } from '@/lib/rules/action-result';
import { ROLES, ROLE_NAMES, type Role } from '@/lib/rules/roles';
import { wordsToOptions } from '@/lib/rules/words-to-options';
import { GuestLimitsDialog } from './guest-limits-dialog';

export interface Member {
  email: string;
  name: string;
  role: Role;
  shots: string[];
  assets: string[];
  state: 'active' | 'invited' | 'disabled';
}

export interface MemberChange {
  show: string;
  email: string;
  role: Role;
  shots?: string[];
  assets?: string[];
}

interface MemberTableProps {
  show: string;
  members: readonly Member[];
  mayEdit: boolean;
  setMember: (input: MemberChange) => Promise<ActionResult<unknown>>;
  removeMember: (input: { show: string; email: string }) => Promise<ActionResult<unknown>>;
}

const roles = wordsToOptions(ROLES, ROLE_NAMES);

/** Everybody in the show with their role, changed in place. */
export function MemberTable({ show, members, mayEdit, setMember, removeMember }: MemberTableProps) {
  const router = useRouter();
  const [leaving, setLeaving] = useState<Member | null>(null);
  const [limited, setLimited] = useState<Member | null>(null);
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

  return (
    <>
      <Table>
        <thead>
          <tr>
            <TableHead className="pl-0">Person</TableHead>
            <TableHead>Role</TableHead>
            {mayEdit ? (
              <TableHead>
                <span className="sr-only">Acts</span>
              </TableHead>
            ) : null}
          </tr>
        </thead>
        <tbody>
          {members.map((member) => (
            <TableRow key={member.email}>
              <TableCell className="max-w-72 py-2 pl-0">
                <span className="block truncate">
                  {member.name}
                  {member.state === 'active' ? null : (
                    <span className="ml-2 text-13 text-ink-3">
                      {member.state === 'invited' ? 'invited' : 'may not sign in'}
                    </span>
                  )}
                </span>
                <span className="block truncate text-13 text-ink-3">{member.email}</span>
                {member.role === 'guest' ? (
                  <span className="block truncate text-13 text-ink-2">{limitsOf(member)}</span>
                ) : null}
              </TableCell>
              <TableCell>
                {mayEdit ? (
                  <Select
                    aria-label={`Role of ${member.name}`}
                    options={roles}
                    value={member.role}
                    disabled={busy}
                    onValueChange={(role) =>
                      run(
                        () => setMember({ show, email: member.email, role: role as Role }),
                        `${member.name} is ${ROLE_NAMES[role as Role]} now`,
                      )
                    }
                    className="w-44"
                  />
                ) : (
                  ROLE_NAMES[member.role]
                )}
              </TableCell>
              {mayEdit ? (
                <TableCell className="pr-0 text-right">
                  {member.role === 'guest' ? (
                    <Button
                      size="small"
                      look="quiet"
                      onClick={() => setLimited(member)}
                      aria-label={`What ${member.name} may see`}
                    >
                      May see
                    </Button>
                  ) : null}
                  <Button
                    size="small"
                    look="quiet"
                    onClick={() => setLeaving(member)}
                    aria-label={`Remove ${member.name}`}
                  >
                    Remove
                  </Button>
                </TableCell>
              ) : null}
            </TableRow>
          ))}
        </tbody>
      </Table>
      {leaving === null ? null : (
        <ConfirmDialog
          open
          onOpenChange={() => setLeaving(null)}
          title={`Remove ${leaving.name}`}
          act="Remove"
          busy={busy}
          onConfirm={() =>
            run(
              () => removeMember({ show, email: leaving.email }),
              `${leaving.name} is out of the show`,
              () => setLeaving(null),
            )
          }
        >
          They no longer find this show. What they did in it stands.
        </ConfirmDialog>
      )}
      {limited === null ? null : (
        <GuestLimitsDialog
          key={limited.email}
          member={limited}
          busy={busy}
          onClose={() => setLimited(null)}
          onSave={(limits) =>
            run(
              () => setMember({ show, email: limited.email, role: 'guest', ...limits }),
              `${limited.name} sees what is named now`,
              () => setLimited(null),
            )
          }
        />
      )}
    </>
  );
}

function limitsOf({ shots, assets }: Member): string {
  if (shots.length + assets.length === 0) return 'sees nothing yet';
  const shown = [...shots, ...assets].slice(0, 4).join(', ');
  const rest = shots.length + assets.length - 4;
  return rest > 0 ? `sees ${shown} and ${rest} more` : `sees ${shown}`;
}
