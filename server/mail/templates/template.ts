import type { LINK_PURPOSES } from '#shared/contracts/people'

/** Where the one link of a mail leads: a page that asks to sign in, or a single-use link made when the mail is sent. */
export type MailLink =
  | {
      path: `/${string}`
      /** A recipient who has never set a password gets an invitation link that leads on to the page. */
      welcomesNewcomers?: boolean
    }
  | { singleUse: (typeof LINK_PURPOSES)[number]; validHours: number; changeId?: string }

export interface MailFrame {
  /** Absolute address of the link. */
  link: string
  recipientName: string
  /** When a single-use link ends, written for the recipient; empty for other links. */
  linkValidUntil: string
  /** Writes a moment (ISO 8601) as date, time and zone of the recipient. */
  moment: (iso: string) => string
}

export interface MailText {
  subject: string
  text: string
}

/**
 * One consequence, one link, dates with zone. Never a price, a limit, a drawing, a competitor's name or a list
 * of recipients. `props` are kept as JSON and hold no secrets.
 */
export interface MailTemplate<P> {
  link: (props: P) => MailLink
  write: (props: P, frame: MailFrame) => MailText
}

/** The text that every mail shares. */
export const letter = (frame: MailFrame, lines: readonly string[]): string => [`Hello ${frame.recipientName},`, '', ...lines, '', 'Dotside', ''].join('\n')
