'use client';
import useSWR from 'swr';

/** What the server said was wrong: RFC 9457 in words. */
export class ApiError extends Error {
  override readonly name = 'ApiError';
  constructor(message: string, readonly status: number, readonly issues: readonly { readonly field: string; readonly message: string }[] = []) {
    super(message);
  }
}

async function failed(response: Response): Promise<ApiError> {
  const problem = (await response.json().catch(() => ({}))) as { title?: string; detail?: string; issues?: { field: string; message: string }[] };
  if (response.status === 401) return new ApiError('Your session has ended. Sign in again; nothing is lost.', 401);
  return new ApiError(problem.detail ?? problem.title ?? 'The server did not answer as expected. Try again.', response.status, problem.issues ?? []);
}

/** Reads JSON of the API. Errors: ApiError in words for the screen. */
export async function readApi<T>(path: string): Promise<T> {
  const response = await fetch(path, { headers: { Accept: 'application/json' } }).catch((cause: unknown) => {
    throw new Error('The server cannot be reached. Check the network and try again.', { cause });
  });
  if (!response.ok) throw await failed(response);
  return (await response.json()) as T;
}

/** Sends a change, JSON or a form. Errors: ApiError with every issue. */
export async function sendApi<T>(path: string, body: object | FormData): Promise<T> {
  const form = body instanceof FormData;
  const response = await fetch(path, { method: 'POST', body: form ? body : JSON.stringify(body), ...(form ? {} : { headers: { 'Content-Type': 'application/json' } }) });
  if (!response.ok) throw await failed(response);
  return (await response.json()) as T;
}

/** Live data of one address of the API. */
export function useApi<T>(path: string | null) {
  return useSWR<T, Error>(path, readApi, { keepPreviousData: true });
}
