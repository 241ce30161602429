/** What became of keeping something: its new version, what stands instead, or why it was not kept. */
export type Kept<T> =
  | { readonly is: 'kept'; readonly version: number }
  | { readonly is: 'stale'; readonly current: T | undefined }
  | { readonly is: 'waiting' | 'refused' };

/**
 * Puts something under the version that was seen. Survives leaving the page. No connection and a server in trouble
 * mean waiting; any other no is a refusal that a press of the button explains.
 */
export async function keepVersion<T>(url: string, version: number, body: string): Promise<Kept<T>> {
  try {
    const response = await fetch(url, {
      method: 'PUT',
      headers: { 'content-type': 'application/json', 'if-match': `"${version}"` },
      body,
      keepalive: true,
    });
    if (response.status >= 500) return { is: 'waiting' };
    const answer = (await response.json()) as { version?: number; current?: T };
    if (response.status === 412) return { is: 'stale', current: answer.current };
    return response.ok && answer.version !== undefined
      ? { is: 'kept', version: answer.version }
      : { is: 'refused' };
  } catch {
    return { is: 'waiting' };
  }
}
