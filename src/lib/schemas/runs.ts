/** Where a run's rows come from. */
export const RUN_SOURCES = ['hand', 'file', 'api'] as const;
export type RunSource = (typeof RUN_SOURCES)[number];
