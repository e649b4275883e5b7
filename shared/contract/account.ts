import { z } from 'zod'
import { EmailAddress, Id, Name, NewPassword, Nothing, Timestamp } from './primitives.js'
import { defineRoute } from './route.js'

export const Person = z
  .object({
    id: Id,
    name: z.string(),
    email: z.string(),
    isAdministrator: z.boolean(),
  })
  .meta({ id: 'Person' })
export type Person = z.infer<typeof Person>

export const Session = z
  .object({
    person: Person.nullable(),
    csrfToken: z.string().meta({ description: 'Send it as the header X-CSRF-Token with every change' }),
    installation: z.object({
      needsFirstAdministrator: z.boolean(),
      demonstrationPeople: z
        .array(z.object({ name: z.string(), email: z.string(), role: z.string(), password: z.string() }))
        .meta({ description: 'Sign-ins of the demonstration; empty on a real installation' }),
      mailDelivery: z.enum(['smtp', 'outbox']),
    }),
  })
  .meta({ id: 'Session' })
export type Session = z.infer<typeof Session>

export const ActiveSession = z
  .object({
    id: z.string(),
    current: z.boolean(),
    startedAt: Timestamp,
    lastUsedAt: Timestamp,
    client: z.string().meta({ description: 'What the browser said it is' }),
  })
  .meta({ id: 'ActiveSession' })
export type ActiveSession = z.infer<typeof ActiveSession>

const group = 'Account'

export const readSession = defineRoute({
  id: 'readSession',
  method: 'get',
  path: '/api/session',
  group,
  summary: 'Who is signed in, and the token that changes need',
  access: 'public',
  reply: Session,
})

export const signIn = defineRoute({
  id: 'signIn',
  method: 'post',
  path: '/api/session',
  group,
  summary: 'Sign in with address and password',
  access: 'public',
  body: z.strictObject({ email: EmailAddress, password: z.string().min(1, 'Enter your password.').max(200) }),
  reply: Session,
})

export const signOut = defineRoute({
  id: 'signOut',
  method: 'delete',
  path: '/api/session',
  group,
  summary: 'Sign out',
  access: 'public',
  reply: Session,
})

export const createFirstAdministrator = defineRoute({
  id: 'createFirstAdministrator',
  method: 'post',
  path: '/api/installation/administrator',
  group,
  summary: 'Make the first administrator of an empty installation and sign in',
  access: 'public',
  body: z.strictObject({ name: Name, email: EmailAddress, password: NewPassword }),
  reply: Session,
  status: 201,
})

export const updateAccount = defineRoute({
  id: 'updateAccount',
  method: 'patch',
  path: '/api/account',
  group,
  summary: 'Change one’s own name',
  access: 'signed-in',
  body: z.strictObject({ name: Name }),
  reply: Person,
})

export const changePassword = defineRoute({
  id: 'changePassword',
  method: 'put',
  path: '/api/account/password',
  group,
  summary: 'Change one’s own password; other sessions end',
  access: 'signed-in',
  body: z.strictObject({ currentPassword: z.string().min(1).max(200), newPassword: NewPassword }),
  reply: Session,
})

export const requestPasswordReset = defineRoute({
  id: 'requestPasswordReset',
  method: 'post',
  path: '/api/password-resets',
  group,
  summary: 'Ask for a mail with a reset link; the answer is the same whether or not the address is known',
  access: 'public',
  body: z.strictObject({ email: EmailAddress }),
  reply: Nothing,
  status: 202,
})

export const resetPassword = defineRoute({
  id: 'resetPassword',
  method: 'put',
  path: '/api/password-resets/:token',
  group,
  summary: 'Set a new password with the link of a reset mail',
  access: 'public',
  params: z.object({ token: z.string().min(20).max(200) }),
  body: z.strictObject({ newPassword: NewPassword }),
  reply: Nothing,
})

export const listSessions = defineRoute({
  id: 'listSessions',
  method: 'get',
  path: '/api/account/sessions',
  group,
  summary: 'Where one is signed in',
  access: 'signed-in',
  reply: z.object({ items: z.array(ActiveSession) }),
})

export const endSession = defineRoute({
  id: 'endSession',
  method: 'delete',
  path: '/api/account/sessions/:sessionId',
  group,
  summary: 'End one of one’s own sessions',
  access: 'signed-in',
  params: z.object({ sessionId: z.string().min(1).max(128) }),
  reply: Nothing,
})
