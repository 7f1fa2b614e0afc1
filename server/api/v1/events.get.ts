import { eventsQuerySchema } from '#shared/schemas/events'
import { defineRoute } from '../../http/define-route'
import { sendEventStream } from '../../http/event-stream'
import { openTopics } from '../../services/events/open-topics'

export default defineRoute({
  access: 'signed-in',
  query: eventsQuerySchema,
  handler: async ({ ctx, query, event }) => sendEventStream(event, await openTopics(ctx, query.topics)),
})
