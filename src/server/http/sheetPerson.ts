/** Who is signed in, in the words of the top bar; a page that asks is never drawn for nobody. */
export function sheetPerson(locals: App.Locals): {
  name: string;
  roles: readonly string[];
  desks: readonly string[];
} {
  if (!locals.person) throw new Error('the page is open to people who are not signed in');
  return { name: locals.person.name, roles: locals.person.roles, desks: locals.deskNames };
}
