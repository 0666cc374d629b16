const answerWithinMs = 10_000;

/** @returns the receiver's status, or null when it gave none */
export async function send(url: string, payload: string, signature: string | null, signal?: AbortSignal): Promise<number | null> {
  const timeout = AbortSignal.timeout(answerWithinMs);
  try {
    const response = await fetch(url, {
      method: 'POST',
      headers: { 'content-type': 'application/json; charset=utf-8', ...(signature === null ? {} : { 'stripe-signature': signature }) },
      body: payload,
      redirect: 'manual',
      signal: signal === undefined ? timeout : AbortSignal.any([timeout, signal]),
    });
    await response.arrayBuffer();
    return response.status;
  } catch {
    return null; // not reachable, too slow, or we are stopping: tried again later
  }
}
