/** One step of the database's shape, forth and back, as SQL. Its name is kept in the database once it is done. */
export interface Migration {
  name: string
  up: string
  down: string
}
