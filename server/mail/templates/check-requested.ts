import { letter, type MailTemplate } from './template'

export interface RevisionMailProps {
  specificationId: string
  revisionId: string
}

export const revisionPath = ({ specificationId, revisionId }: RevisionMailProps): `/${string}` => `/specifications/${specificationId}/revisions/${revisionId}`

/** To the checkers of the company. */
export const checkRequestedMail: MailTemplate<RevisionMailProps> = {
  link: (props) => ({ path: revisionPath(props) }),
  write: (_, frame) => ({
    subject: 'A winding specification waits for your check',
    text: letter(frame, ['A draft has been handed to check. Nobody who worked on it can release it.', '', `Check it here: ${frame.link}`]),
  }),
}
