import { letter, type MailTemplate } from './template'

export interface ChangeRequestedProps {
  personName: string
  kind: 'roles' | 'email' | 'removal'
}

const CONSEQUENCE: Record<ChangeRequestedProps['kind'], string> = {
  roles: 'a change of the roles',
  email: 'a change of the mail address',
  removal: 'the removal',
}

/** To those who may be the second person. */
export const changeRequestedMail: MailTemplate<ChangeRequestedProps> = {
  link: () => ({ path: '/people' }),
  write: ({ personName, kind }, frame) => ({
    subject: 'A change waits for a second person',
    text: letter(frame, [`${CONSEQUENCE[kind][0]!.toUpperCase()}${CONSEQUENCE[kind].slice(1)} of ${personName} waits for a second person.`, '', `Decide here: ${frame.link}`]),
  }),
}
