export { findPerson, listPeople, peopleById, type PersonRow } from './repository.ts'
export { addPerson } from './use-cases/add-person.ts'
export { recordSignIn } from './use-cases/record-sign-in.ts'
export { peopleRoutes, type Neighbours } from './routes.ts'
