import { revisionPath, type RevisionMailProps } from './check-requested'
import { letter, type MailTemplate } from './template'

export interface RevisionReleasedProps extends RevisionMailProps {
  revision: string
}

/** To those who go on with it: engineers and buyers of the company. */
export const revisionReleasedMail: MailTemplate<RevisionReleasedProps> = {
  link: (props) => ({ path: revisionPath(props) }),
  write: ({ revision }, frame) => ({
    subject: `Revision ${revision} of a winding specification is released`,
    text: letter(frame, [`Revision ${revision} has been released; earlier revisions of the part are superseded.`, '', `See it here: ${frame.link}`]),
  }),
}
