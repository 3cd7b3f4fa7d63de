import { revisionPath, type RevisionMailProps } from './check-requested'
import { letter, type MailTemplate } from './template'

/** To the author; the reason stands on the page, not in the mail. */
export const draftReturnedMail: MailTemplate<RevisionMailProps> = {
  link: (props) => ({ path: revisionPath(props) }),
  write: (_, frame) => ({
    subject: 'Your draft came back from check',
    text: letter(frame, ['The checker sent your draft back with a reason.', '', `Read the reason and go on here: ${frame.link}`]),
  }),
}
