import type { ReactElement, ReactNode } from 'react';
import { type TagTone, tagLook } from './look';

/** A short word in a frame, in an island. */
export function Tag({ tone = 'plain', children }: { tone?: TagTone; children: ReactNode }): ReactElement {
  return <span className={tagLook(tone)}>{children}</span>;
}
