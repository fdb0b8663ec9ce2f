import { z } from 'zod'
import { accountSchema, updateUserRequestSchema } from '#shared/contract/session.ts'
import { patchUser, readUsers } from '../controllers/userController.ts'
import { userParams } from './params.ts'
import { defineRoute } from './route.ts'

export const userRoutes = [
  defineRoute({
    method: 'get',
    path: '/api/users',
    policy: 'administer-installation',
    summary: 'Everybody with an account',
    answers: { 200: z.array(accountSchema) },
    controller: readUsers,
  }),
  defineRoute({
    method: 'patch',
    path: '/api/users/:userId',
    policy: 'administer-installation',
    summary: 'Change a person’s installation role, or disable the account',
    params: userParams,
    body: updateUserRequestSchema,
    answers: { 200: accountSchema },
    controller: patchUser,
  }),
]
