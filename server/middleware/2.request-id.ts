import { randomUUID } from 'node:crypto'
import { setResponseHeader } from 'h3'

/** A name for each request, to find it in the log. */
export default defineEventHandler((event) => {
  setResponseHeader(event, 'x-request-id', randomUUID())
})
