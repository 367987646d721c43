/** The name on the record, as staff tell children apart; `row` is the alias of a child or referral. */
export const recordName = (row: string): string => `CONCAT(${row}.givenName, ' ', ${row}.familyName)`

/** The name a child goes by, in front of the family name: for letters, families and teachers. */
export const calledName = (row: string): string =>
  `CONCAT(COALESCE(${row}.preferredName, ${row}.givenName), ' ', ${row}.familyName)`

/** What the child is called when somebody who knows them is asked about them. */
export const spokenName = (row: string): string => `COALESCE(${row}.preferredName, ${row}.givenName)`

interface ChildNames {
  givenName: string
  preferredName: string | null
  familyName: string
}

/** Every way to write a child's whole name: the name on the record and the one they go by. */
export const wholeNames = ({ givenName, preferredName, familyName }: ChildNames): string[] =>
  [givenName, preferredName].flatMap((name) => (name === null ? [] : [`${name} ${familyName}`]))
