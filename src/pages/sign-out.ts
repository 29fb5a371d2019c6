import type { APIRoute } from 'astro';
import { paths } from '@/lib/paths';
import { redirectWith, signOut } from '@/lib/server/auth/browser-session';

export const POST: APIRoute = async (context) => redirectWith(paths.home, await signOut(context));

/** Typed into the address bar it does nothing: leaving is a deed, and deeds are posted. */
export const GET: APIRoute = ({ redirect }) => redirect(paths.home, 303);
