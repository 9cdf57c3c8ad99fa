import type { ReactNode } from 'react';
import { Icon } from './icon';
import type { IconName } from './icon';

const tones = {
  plain: 'border-paper-line bg-paper-raised text-ink',
  halt: 'border-halt bg-halt-wash text-ink',
  fine: 'border-fine bg-fine-wash text-ink',
} as const;

type Props = {
  readonly tone?: keyof typeof tones;
  readonly icon?: IconName;
  readonly title?: string;
  readonly live?: 'status' | 'alert';
  readonly children: ReactNode;
};

/** A few words that stand apart from the rest of the page. */
export function Notice({ tone = 'plain', icon, title, live, children }: Props) {
  return (
    <div role={live} className={`flex gap-3 rounded-lg border-2 p-3 ${tones[tone]}`}>
      {icon && <Icon name={icon} className="mt-0.5 size-6" />}
      <div className="min-w-0">
        {title && <p className="font-bold">{title}</p>}
        {children}
      </div>
    </div>
  );
}
