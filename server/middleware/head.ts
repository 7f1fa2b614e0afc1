import { defineEventHandler } from 'h3'

/** HEAD is answered wherever GET is (RFC 9110, 9.1): routes see a GET, and Node leaves the body of the answer out. */
export default defineEventHandler((event) => {
  if (event.method === 'HEAD') event._method = 'GET'
})
