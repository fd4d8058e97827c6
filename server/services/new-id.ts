import { uuidv7 } from 'uuidv7'

/** Identity of an operation or a record that the office makes: UUID version 7. */
export function newId(): string {
  return uuidv7()
}
