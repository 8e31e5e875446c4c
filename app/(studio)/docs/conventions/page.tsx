import type { Metadata } from 'next';
import { CanonicalForm } from '@/components/docs/canonical-form';
import { PageHeading } from '@/components/shell/page-heading';
import { exampleValue } from '@/lib/values/example-value';

export const metadata: Metadata = { title: 'Conventions' };

export default function ConventionsPage() {
  const { canonical, valueSha256 } = exampleValue();
  return (
    <>
      <PageHeading title="Conventions" />
      <CanonicalForm example={{ canonical: canonical ?? '', valueSha256: valueSha256 ?? '' }} />
    </>
  );
}
