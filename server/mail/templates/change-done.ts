import { letter, type MailTemplate } from './template'

export interface ChangeDoneProps {
  kind: 'roles' | 'email' | 'removal'
  at: string
}

const CONSEQUENCE: Record<ChangeDoneProps['kind'], string> = {
  roles: 'Your roles have been changed',
  email: 'The mail address that you sign in with has been changed',
  removal: 'Your access has been ended',
}

/** To the person concerned, at the address in force before the change. */
export const changeDoneMail: MailTemplate<ChangeDoneProps> = {
  link: () => ({ path: '/sign-in' }),
  write: ({ kind, at }, frame) => ({
    subject: CONSEQUENCE[kind],
    text: letter(frame, [`${CONSEQUENCE[kind]} on ${frame.moment(at)}; every session has ended.`, '', `Dotside is here: ${frame.link}`]),
  }),
}
