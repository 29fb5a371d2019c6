import { paths } from '@/lib/paths';
import { settings } from '../settings';

/** A one-time link as it is handed over. */
export function invitationLink(url: URL, token: string): string {
  return new URL(paths.invitation(token), settings().publicOrigin ?? url.origin).href;
}
