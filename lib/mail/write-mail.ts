import type { MailModel, WrittenMail } from "./model";
import { toHtml } from "./templates/html";
import { toText } from "./templates/text";

/** Writes both parts of a mail. */
export const writeMail = (mail: MailModel): WrittenMail => ({ subject: mail.subject, text: toText(mail), html: toHtml(mail) });
