/** An address as it may be logged: whoever reads a welcome or reset link can choose the account's password. */
export function hideSecrets(url: string): string {
  return url.replace(/(\/welcome\/)[^/?#]+/g, '$1[hidden]');
}
