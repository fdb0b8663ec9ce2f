import { z } from 'zod'
import {
  buildLinkSchema,
  joinedSchema,
  joinRequestSchema,
  linkViewSchema,
  madeLinkSchema,
  makeLinkRequestSchema,
} from '#shared/contract/buildLinks.ts'
import { deleteBuildGuest, deleteBuildLink, postBuildLink, readBuildLinks } from '../controllers/buildLinkController.ts'
import { deleteGuest, postGuest, readLink } from '../controllers/guestController.ts'
import { buildParams, guestParams, linkParams, tokenParams } from './params.ts'
import { defineRoute } from './route.ts'

export const buildLinkRoutes = [
  defineRoute({
    method: 'get',
    path: '/api/builds/:buildId/links',
    policy: 'own-build',
    summary: 'Links into the build, and who came by them',
    params: buildParams,
    answers: { 200: z.array(buildLinkSchema) },
    controller: readBuildLinks,
  }),
  defineRoute({
    method: 'post',
    path: '/api/builds/:buildId/links',
    policy: 'own-build',
    summary: 'Make a link for people without an account; its token is told this once',
    params: buildParams,
    body: makeLinkRequestSchema,
    rateLimit: 'invite',
    answers: { 201: madeLinkSchema },
    controller: postBuildLink,
  }),
  defineRoute({
    method: 'delete',
    path: '/api/builds/:buildId/links/:linkId',
    policy: 'own-build',
    summary: 'Revoke a link: its guests are out at once',
    params: linkParams,
    answers: { 204: null },
    controller: deleteBuildLink,
  }),
  defineRoute({
    method: 'delete',
    path: '/api/builds/:buildId/guests/:guestId',
    policy: 'own-build',
    summary: 'Close a guest out',
    params: guestParams,
    answers: { 204: null },
    controller: deleteBuildGuest,
  }),
  defineRoute({
    method: 'get',
    path: '/api/links/:token',
    policy: 'anybody',
    summary: 'What a link leads to',
    params: tokenParams,
    rateLimit: 'open-link',
    answers: { 200: linkViewSchema },
    controller: readLink,
  }),
  defineRoute({
    method: 'post',
    path: '/api/links/:token/guests',
    policy: 'anybody',
    summary: 'Come in by a link, under a name',
    params: tokenParams,
    body: joinRequestSchema,
    rateLimit: 'join-link',
    answers: { 201: joinedSchema },
    controller: postGuest,
  }),
  defineRoute({
    method: 'delete',
    path: '/api/guest',
    policy: 'anybody',
    summary: 'Leave as a guest',
    answers: { 204: null },
    controller: deleteGuest,
  }),
]
