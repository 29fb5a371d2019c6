/** Every address of the site, in one place. */
export const paths = {
  home: '/',
  signIn: (next?: string) => (next ? `/sign-in?next=${encodeURIComponent(next)}` : '/sign-in'),
  signOut: '/sign-out',
  signUp: '/sign-up',
  invitation: (token: string) => `/invitation/${token}`,
  theme: '/theme',
  account: '/account',
  machines: '/machines',
  newMachine: '/machines/new',
  machine: (id: string) => `/machines/${id}`,
  editMachine: (id: string) => `/machines/${id}/edit`,
  runs: (machineId?: string) => (machineId ? `/runs?machine=${machineId}` : '/runs'),
  newRun: (machineId?: string) => (machineId ? `/runs/new?machine=${machineId}` : '/runs/new'),
  run: (id: string) => `/runs/${id}`,
  importRun: (machineId?: string) => (machineId ? `/runs/import?machine=${machineId}` : '/runs/import'),
  people: '/people',
  api: {
    health: '/api/v1/health',
    simulate: '/api/v1/simulate',
    compare: '/api/v1/compare',
    openapi: '/api/v1/openapi.json',
    machines: '/api/v1/machines',
    machine: (id: string) => `/api/v1/machines/${id}`,
    exclusions: (machineId: string) => `/api/v1/machines/${machineId}/exclusions`,
    exclusion: (machineId: string, id: string) => `/api/v1/machines/${machineId}/exclusions/${id}`,
    runs: '/api/v1/runs',
    run: (id: string) => `/api/v1/runs/${id}`,
    runSteps: (id: string) => `/api/v1/runs/${id}/steps`,
    runStep: (id: string, seq: number) => `/api/v1/runs/${id}/steps/${seq}`,
    runCorrections: (id: string) => `/api/v1/runs/${id}/corrections`,
    runFinish: (id: string) => `/api/v1/runs/${id}/finish`,
    runCsv: (id: string) => `/api/v1/runs/${id}/csv`,
    runFile: (id: string) => `/api/v1/runs/${id}/file`,
    importCheck: '/api/v1/imports/check',
    imports: '/api/v1/imports',
    people: '/api/v1/people',
    person: (id: string) => `/api/v1/people/${id}`,
    invitations: '/api/v1/invitations',
    invitation: (id: string) => `/api/v1/invitations/${id}`,
  },
} as const;

/** Only an address of this site may be gone to after signing in. */
export function safeNext(value: string | null | undefined): string {
  return value?.startsWith('/') && !value.startsWith('//') && !value.includes('\\') ? value : paths.machines;
}
