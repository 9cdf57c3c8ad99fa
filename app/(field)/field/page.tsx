import type { Metadata } from 'next';
import { FieldShell } from './_shell/field-shell';
import { themeScript } from './_shell/theme-script';

export const dynamic = 'force-static';
export const metadata: Metadata = { title: 'Field book', icons: { icon: '/icons/lammas.svg' } };

/** The one page of the field: static, and everything after it happens on the device. */
export default function FieldPage() {
  return (
    <>
      <script dangerouslySetInnerHTML={{ __html: themeScript }} />
      <FieldShell />
    </>
  );
}
