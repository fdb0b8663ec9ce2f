/** Control characters of names and messages would steer the terminal: they are left out; line breaks stay. */
export const printable = (text: string): string =>
  text.replace(/[\p{Cc}\p{Cf}]/gu, (sign) => (sign === '\n' ? sign : ''))
