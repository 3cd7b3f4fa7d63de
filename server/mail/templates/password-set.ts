import { letter, type MailTemplate } from './template'

export interface PasswordSetProps {
  at: string
}

export const passwordSetMail: MailTemplate<PasswordSetProps> = {
  link: () => ({ path: '/forgotten-password' }),
  write: ({ at }, frame) => ({
    subject: 'Your password has been set',
    text: letter(frame, [
      `Your password was set on ${frame.moment(at)}; every session has ended.`,
      '',
      `If it was not you, ask for a new one here: ${frame.link}`,
    ]),
  }),
}
