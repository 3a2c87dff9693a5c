type Name = { familyName: string; givenName: string }

const plain = (text: string) => text.normalize('NFC').trim().replace(/\s+/g, ' ').toLocaleLowerCase('en')

/** Whether two names are the same but for capitals and spaces. */
export function isSameName(a: Name, b: Name): boolean {
  return plain(a.familyName) === plain(b.familyName) && plain(a.givenName) === plain(b.givenName)
}
