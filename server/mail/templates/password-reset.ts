import { letter, type MailTemplate } from './template'

export const passwordResetMail: MailTemplate<Record<string, never>> = {
  link: () => ({ singleUse: 'password-reset', validHours: 2 }),
  write: (_, frame) => ({
    subject: 'Set a new password',
    text: letter(frame, [
      'Somebody, probably you, has asked for a new password. If it was not you, nothing has to be done.',
      '',
      `Set it here: ${frame.link}`,
      `The link works once and until ${frame.linkValidUntil}.`,
    ]),
  }),
}
