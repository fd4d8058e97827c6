import { defineEventHandler, type EventHandlerRequest, type EventHandlerResponse, type H3Event } from 'h3'
import { answer } from './answer'

/** A route: validate, authorise, call one function, return. */
export function defineHandler<T>(work: (event: H3Event<EventHandlerRequest>) => Promise<T>) {
  return defineEventHandler<EventHandlerRequest, EventHandlerResponse<Promise<T>>>(event => answer(event, () => work(event)))
}
