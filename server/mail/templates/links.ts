/** Where each mail's one link leads: pages of the app, under the public origin. */
export function links(publicUrl: string) {
  const base = publicUrl.replace(/\/+$/, '');
  return {
    loan: (loanId: string): string => `${base}/loans/${encodeURIComponent(loanId)}`,
    bench: (loanId: string): string => `${base}/bench/${encodeURIComponent(loanId)}`,
    reset: (token: string): string => `${base}/reset/${encodeURIComponent(token)}`,
    invitation: (token: string): string => `${base}/invitation/${encodeURIComponent(token)}`,
  };
}
