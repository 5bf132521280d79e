export { PeopleTable } from './components/people-table.tsx'
export { peopleQuery } from './queries.ts'
