import {
  activityPageSchema,
  buildEventsQuerySchema,
  listActivityQuerySchema,
  liveEventSchema,
  presenceRequestSchema,
} from '#shared/contract/live.ts'
import {
  listNoticesQuerySchema,
  noticePageSchema,
  readNoticesRequestSchema,
  unreadSchema,
} from '#shared/contract/notifications.ts'
import {
  postRead,
  putPresence,
  readActivity,
  readNotifications,
  streamBuild,
  streamPerson,
} from '../controllers/liveController.ts'
import { buildParams } from './params.ts'
import { defineRoute } from './route.ts'

export const liveRoutes = [
  defineRoute({
    method: 'get',
    path: '/api/builds/:buildId/events',
    policy: 'see-build',
    summary: 'What happens in a build, as it happens; after a break, what was missed',
    params: buildParams,
    query: buildEventsQuerySchema,
    streams: true,
    answers: { 200: liveEventSchema },
    controller: streamBuild,
  }),
  defineRoute({
    method: 'put',
    path: '/api/builds/:buildId/presence',
    policy: 'see-build',
    summary: 'What is chosen in a tab that has the build open, shown to the others there',
    params: buildParams,
    body: presenceRequestSchema,
    rateLimit: 'presence',
    answers: { 204: null },
    controller: putPresence,
  }),
  defineRoute({
    method: 'get',
    path: '/api/builds/:buildId/activity',
    policy: 'see-build',
    summary: 'Who did what, newest first',
    params: buildParams,
    query: listActivityQuerySchema,
    answers: { 200: activityPageSchema },
    controller: readActivity,
  }),
  defineRoute({
    method: 'get',
    path: '/api/events',
    policy: 'signed-in',
    summary: 'How many notifications wait, whenever that changes',
    streams: true,
    answers: { 200: liveEventSchema },
    controller: streamPerson,
  }),
  defineRoute({
    method: 'get',
    path: '/api/notifications',
    policy: 'signed-in',
    summary: 'What concerns the person, newest first',
    query: listNoticesQuerySchema,
    answers: { 200: noticePageSchema },
    controller: readNotifications,
  }),
  defineRoute({
    method: 'post',
    path: '/api/notifications/read',
    policy: 'signed-in',
    summary: 'Mark one notification as read, or all up to one',
    body: readNoticesRequestSchema,
    answers: { 200: unreadSchema },
    controller: postRead,
  }),
]
