export type ButtonKind = 'primary' | 'plain' | 'quiet' | 'danger';

const KIND_CLASS: Record<ButtonKind, string> = {
  primary: 'btn btn-primary',
  plain: 'btn',
  quiet: 'btn btn-quiet',
  danger: 'btn btn-danger',
};

/** The classes of a button, shared by the Astro and the React one. */
export function buttonClass(kind: ButtonKind, block = false, extra?: string | null): string {
  return [KIND_CLASS[kind], block ? 'btn-block' : '', extra ?? ''].filter(Boolean).join(' ');
}
