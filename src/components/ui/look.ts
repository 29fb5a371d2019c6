/**
 * Class strings of the primitives, in one place: the Astro and the React form of each take them from here,
 * so that a page drawn on the server and an island look the same.
 */

export const BUTTON_VARIANTS = ['main', 'quiet', 'danger'] as const;
export type ButtonVariant = (typeof BUTTON_VARIANTS)[number];

const BUTTON =
  'inline-flex min-h-11 items-center justify-center gap-2 border px-4 py-2 text-center leading-tight no-underline ' +
  'disabled:border-rule disabled:bg-transparent disabled:text-ink-soft aria-disabled:opacity-60';

const BUTTON_LOOK: Record<ButtonVariant, string> = {
  main: 'border-verdigris bg-verdigris font-bold text-on-verdigris hover:border-ink hover:bg-ink hover:text-paper',
  quiet: 'border-rule-firm bg-leaf text-ink hover:border-ink hover:bg-verdigris-wash',
  // Not vermilion: that says something is wrong. What cannot be undone carries the hatching of a cut face.
  danger:
    'relative border-ink bg-leaf pl-7 text-ink hover:bg-ink hover:text-paper before:absolute before:inset-y-0 ' +
    'before:left-0 before:w-3 before:border-r before:border-ink before:content-[""] before:hatched-firm',
};

export function buttonLook(variant: ButtonVariant): string {
  return `${BUTTON} ${BUTTON_LOOK[variant]}`;
}

export const FIELD = {
  wrap: 'grid content-start gap-1.5',
  label: 'text-sm font-bold',
  optional: 'font-normal text-ink-soft',
  hint: 'text-sm text-ink-soft',
  error: 'flex gap-2 text-sm text-vermilion',
  errorMark: 'mt-[0.35em] size-2.5 shrink-0',
  control:
    'min-h-11 w-full border border-rule-firm border-b-ink bg-leaf px-3 py-2 text-base text-ink placeholder:text-ink-soft ' +
    'hover:border-ink disabled:border-rule disabled:text-ink-soft aria-invalid:border-2 aria-invalid:border-vermilion',
  select: 'appearance-none pr-9 select-arrow',
} as const;

export const NOTICE_KINDS = ['note', 'done', 'refused', 'caution'] as const;
export type NoticeKind = (typeof NOTICE_KINDS)[number];

/** The word that opens each kind, so that no notice rests on its colour. */
export const NOTICE_WORDS: Record<NoticeKind, string> = {
  note: 'Note',
  done: 'Done',
  refused: 'Not done',
  caution: 'Caution',
};

/** How a notice reaches somebody who cannot see it appear. */
export const NOTICE_ROLES: Record<NoticeKind, 'note' | 'status' | 'alert'> = {
  note: 'note',
  done: 'status',
  refused: 'alert',
  caution: 'note',
};

export const NOTICE = {
  wrap: 'grid grid-cols-[0.75rem_1fr] border border-rule-firm bg-leaf',
  body: 'grid gap-1 px-4 py-3',
  bar: {
    note: 'border-r border-rule-firm bg-ink-soft',
    done: 'border-r border-rule-firm bg-verdigris',
    refused: 'border-r border-vermilion bg-vermilion',
    caution: 'border-r border-ink hatched-firm',
  } satisfies Record<NoticeKind, string>,
  word: {
    note: 'font-bold',
    done: 'font-bold text-verdigris',
    refused: 'font-bold text-vermilion',
    caution: 'font-bold',
  } satisfies Record<NoticeKind, string>,
} as const;

export const TAG_TONES = ['plain', 'good', 'wrong', 'dotted'] as const;
export type TagTone = (typeof TAG_TONES)[number];

const TAG = 'inline-block border px-1.5 text-[0.8125rem] leading-5 whitespace-nowrap';
const TAG_LOOK: Record<TagTone, string> = {
  plain: 'border-rule-firm text-ink',
  good: 'border-verdigris text-verdigris',
  wrong: 'border-vermilion bg-vermilion text-on-vermilion',
  dotted: 'border-dotted border-ink-soft text-ink-soft',
};
export function tagLook(tone: TagTone): string {
  return `${TAG} ${TAG_LOOK[tone]}`;
}

/** A section headed in its margin where there is room, as in a record book. */
export const PANEL = {
  wrap: '@container border-t border-ink pt-4 pb-10',
  grid: 'grid gap-x-8 gap-y-4 @3xl:grid-cols-[11rem_minmax(0,1fr)]',
  stack: 'grid gap-4',
  title: 'text-base font-bold',
  aside: 'mt-2 text-sm text-ink-soft',
} as const;

export const EMPTY = {
  wrap: 'grid justify-items-start gap-3 border border-dashed border-rule-firm px-5 py-8',
  title: 'text-base font-bold',
  text: 'max-w-[60ch] text-ink-soft',
} as const;
