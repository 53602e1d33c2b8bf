import { startMail } from "./server";

const { FAKE_MAIL_PORT, FAKE_INBOX_PORT, FAKE_MAIL_FOLDER } = process.env;
if (!FAKE_MAIL_PORT || !FAKE_INBOX_PORT || !FAKE_MAIL_FOLDER) throw new Error("FAKE_MAIL_PORT, FAKE_INBOX_PORT and FAKE_MAIL_FOLDER must be set.");

const mail = await startMail({ smtpPort: Number(FAKE_MAIL_PORT), inboxPort: Number(FAKE_INBOX_PORT), folder: FAKE_MAIL_FOLDER });
console.log(`local inbox on 127.0.0.1:${mail.inboxPort}, mail on 127.0.0.1:${mail.smtpPort}`);
for (const signal of ["SIGINT", "SIGTERM"] as const) process.once(signal, () => void mail.close().then(() => process.exit(0)));
