import { startLocalMailServer } from './mail/local-mail-server'
import { whenToldToStop } from './mail/when-told-to-stop'

/** `node --import tsx db/local-mail.ts`: the local mail server on LOCAL_MAIL_PORT, with LOCAL_MAIL_FOLDER, until told to stop. */
const { LOCAL_MAIL_FOLDER: folder, LOCAL_MAIL_PORT: port } = process.env
if (!folder || !port) throw new Error('LOCAL_MAIL_FOLDER and LOCAL_MAIL_PORT must be set')
const server = await startLocalMailServer({ folder, port: Number(port) })
whenToldToStop(server.stop)
