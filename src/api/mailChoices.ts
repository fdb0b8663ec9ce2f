import {
  mailChoicesSchema,
  subscriptionSchema,
  type MailChoice,
  type MailChoices,
  type Subscription,
} from '#shared/contract/mailChoices.ts'
import { request, step } from './client.ts'

export const readMailChoices = (signal?: AbortSignal): Promise<MailChoices> =>
  request(mailChoicesSchema, 'GET', '/api/account/mail-choices', { signal })

export const putMailChoice = (choice: MailChoice): Promise<MailChoices> =>
  request(mailChoicesSchema, 'PUT', '/api/account/mail-choices', { body: choice })

/** Works signed out: the link is the proof. */
export const unsubscribe = (token: string): Promise<Subscription> =>
  request(subscriptionSchema, 'POST', `/api/unsubscribe/${step(token)}`, { anonymous: true })

export const resubscribe = (token: string): Promise<Subscription> =>
  request(subscriptionSchema, 'POST', `/api/unsubscribe/${step(token)}/undo`, { anonymous: true })
