export type NoticeKind = 'info' | 'warn' | 'danger' | 'ok';

/** The word that stands before the text, so the kind is never told by colour alone. */
export const NOTICE_WORD: Record<NoticeKind, string> = {
  info: 'Note',
  warn: 'Check',
  danger: 'Not done',
  ok: 'Done',
};
