/** A new random id, 24 characters of base 36 and not guessable; safe in URLs. Works in the browser and on the server. */
export function newId(): string {
  const bytes = crypto.getRandomValues(new Uint8Array(24))
  return Array.from(bytes, (byte) => (byte % 36).toString(36)).join('')
}
