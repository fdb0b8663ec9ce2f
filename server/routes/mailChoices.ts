import { mailChoicesSchema, putMailChoiceRequestSchema, subscriptionSchema } from '#shared/contract/mailChoices.ts'
import {
  postResubscribe,
  postUnsubscribe,
  putMailChoice,
  readMailChoices,
} from '../controllers/mailChoiceController.ts'
import { sealedParams } from './params.ts'
import { defineRoute } from './route.ts'

export const mailChoiceRoutes = [
  defineRoute({
    method: 'get',
    path: '/api/account/mail-choices',
    policy: 'signed-in',
    summary: 'Which mails one gets, and when',
    answers: { 200: mailChoicesSchema },
    controller: readMailChoices,
  }),
  defineRoute({
    method: 'put',
    path: '/api/account/mail-choices',
    policy: 'signed-in',
    summary: 'Choose when mails of one kind come',
    body: putMailChoiceRequestSchema,
    answers: { 200: mailChoicesSchema },
    controller: putMailChoice,
  }),
  defineRoute({
    method: 'post',
    path: '/api/unsubscribe/:token',
    policy: 'anybody',
    summary: 'Switch mails of one kind off, by the link in one of them (RFC 8058)',
    params: sealedParams,
    rateLimit: 'use-link',
    isOneClick: true,
    answers: { 200: subscriptionSchema },
    controller: postUnsubscribe,
  }),
  defineRoute({
    method: 'post',
    path: '/api/unsubscribe/:token/undo',
    policy: 'anybody',
    summary: 'Switch them on again, as they were',
    params: sealedParams,
    rateLimit: 'use-link',
    answers: { 200: subscriptionSchema },
    controller: postResubscribe,
  }),
]
