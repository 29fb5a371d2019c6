import type { ReactElement, ReactNode } from 'react';
import { NOTICE, NOTICE_ROLES, NOTICE_WORDS, type NoticeKind } from './look';

interface Props {
  readonly kind?: NoticeKind;
  readonly title?: string;
  readonly children: ReactNode;
}

/** Something to be told inside an island; the roles make it heard when it appears. */
export function Notice({ kind = 'note', title = NOTICE_WORDS[kind], children }: Props): ReactElement {
  return (
    <div className={NOTICE.wrap} role={NOTICE_ROLES[kind]}>
      <span className={NOTICE.bar[kind]} aria-hidden="true" />
      <div className={NOTICE.body}>
        <p className={NOTICE.word[kind]}>{title}</p>
        <div>{children}</div>
      </div>
    </div>
  );
}
