/** What each mail says. Plain text, one purpose a mail, the link on a line of its own. */
export interface Message {
  kind: string
  recipient: string
  subject: string
  text: string
}

const SIGNATURE = '\n\n-- \nTierlight, current matching of multi-junction cells'

export function invitationMessage(invitation: {
  recipient: string
  inviter: string
  projectName: string
  roles: readonly string[]
  link: string
  validDays: number
}): Message {
  const { recipient, inviter, projectName, roles, link, validDays } = invitation
  return {
    kind: 'invitation',
    recipient,
    subject: `${inviter} invites you to the project “${projectName}”`,
    text: `${inviter} invites you to work on the project “${projectName}” as ${roles.join(' and ')}.\n\nAccept here, within ${validDays} days:\n${link}\n\nIf you did not expect this, you need not do anything.${SIGNATURE}`,
  }
}

export function passwordResetMessage(reset: {
  recipient: string
  name: string
  link: string
  validHours: number
}): Message {
  const { recipient, name, link, validHours } = reset
  return {
    kind: 'password-reset',
    recipient,
    subject: 'Set a new password',
    text: `${name}, somebody (we hope you) asked for a new password of your account.\n\nSet it here, within ${validHours} hours; the link works once:\n${link}\n\nIf it was not you, your password stays as it is and you need not do anything.${SIGNATURE}`,
  }
}

export function accountMessage(account: {
  recipient: string
  name: string
  link: string
  validHours: number
}): Message {
  const { recipient, name, link, validHours } = account
  return {
    kind: 'account',
    recipient,
    subject: 'Your account',
    text: `${name}, an administrator made an account for you.\n\nSet your password here, within ${validHours} hours; the link works once:\n${link}${SIGNATURE}`,
  }
}
