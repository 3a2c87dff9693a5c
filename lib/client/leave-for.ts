/**
 * Goes to another page by a whole new load rather than within the application, so that nothing of the person who was signed in
 * before, and no list read under other rights, stays in memory. For signing in, signing out and unlocking.
 */
export function leaveFor(path: string): void {
  window.location.assign(path)
}
