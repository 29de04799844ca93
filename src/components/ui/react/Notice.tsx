import type { ReactNode } from 'react';
import { NOTICE_WORD, type NoticeKind } from '../notice';

interface NoticeProps {
  kind?: NoticeKind;
  title?: string;
  children?: ReactNode;
}

/** React twin of Notice.astro. Danger interrupts; the other kinds are announced politely. */
export function Notice({ kind = 'info', title, children }: NoticeProps) {
  return (
    <div className={`notice notice-${kind}`} role={kind === 'danger' ? 'alert' : 'status'}>
      <p className="notice-title">{title ?? NOTICE_WORD[kind]}</p>
      {children}
    </div>
  );
}
