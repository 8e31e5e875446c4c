import Link from 'next/link';
import { Notice } from '@/components/shell/notice';
import { Button } from '@/components/ui/button';

export default function NotFound() {
  return (
    <Notice
      title="Nothing at this address"
      action={
        <Button asChild>
          <Link href="/shows">To your shows</Link>
        </Button>
      }
    >
      It does not exist, or it belongs to a show that you are not a member of.
    </Notice>
  );
}
