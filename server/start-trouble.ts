import type { Settings } from '#server/env.ts';

/** Why a start failed and what to do, in a sentence where the cause is a known one. */
export function startTrouble(error: unknown, settings: Settings): string {
  const { code, syscall, path } = (error ?? {}) as NodeJS.ErrnoException;
  if (code === 'EADDRINUSE')
    return `Port ${settings.port} is taken by another program. Stop it, or set PORT to another number.`;
  if (syscall === 'listen' || syscall === 'getaddrinfo')
    return `Fringeward cannot listen on ${settings.host}, port ${settings.port} (${code}). Set HOST and PORT to an address of this machine.`;
  if (
    path?.startsWith(settings.dataDir) &&
    ['EACCES', 'EPERM', 'EROFS', 'ENOTDIR', 'EEXIST'].includes(code ?? '')
  )
    return `The data folder ${settings.dataDir} cannot be used (${code}). Set DATA_DIR to a folder that can be written.`;
  if (settings.databaseUrl !== undefined && (isConnectionFault(code) || isSignInFault(code)))
    return `The database of DATABASE_URL cannot be reached (${code}). Check that it runs, its address, its user and its password.`;
  return `Fringeward could not start: ${error instanceof Error ? (error.stack ?? error.message) : String(error)}`;
}

function isConnectionFault(code: string | undefined): boolean {
  return ['ECONNREFUSED', 'ENOTFOUND', 'ETIMEDOUT', 'EHOSTUNREACH', 'ECONNRESET', 'EAI_AGAIN'].includes(
    code ?? '',
  );
}

/** PostgreSQL's classes 28 (authorisation) and 3D (no such database). */
function isSignInFault(code: string | undefined): boolean {
  return /^(28|3D)...$/.test(code ?? '');
}
