/** The way mails leave the house, for the process that sends them. */
export { smtpTransport } from '@/lib/mail/smtp';
