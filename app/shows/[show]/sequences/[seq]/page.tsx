import type { Metadata } from 'next';
import { SequencePage } from '@/components/shots/sequence-page';
import { getPageSequence } from '@/lib/shots/get-page-shot';
import { shotActs } from '@/lib/shots/shot-acts';
import { getPageShow } from '@/lib/shows/get-page-show';
import { lockShotsAction, relockValuesAction } from '../../shots/actions';

type Props = { params: Promise<{ show: string; seq: string }> };

export async function generateMetadata({ params }: Props): Promise<Metadata> {
  return { title: decodeURIComponent((await params).seq) };
}

export default async function Page({ params }: Props) {
  const { show, seq } = await params;
  const { context, access } = await getPageShow(show, 'readShow');
  const sequence = await getPageSequence(context, access.show.code, seq);
  return (
    <SequencePage show={access.show.code} unit={access.show.linearUnit} acts={shotActs(access)} sequence={sequence} lockShots={lockShotsAction} relock={relockValuesAction} />
  );
}
