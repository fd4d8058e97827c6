import { signedInOf } from '#server/services/sign-in'
import { defineHandler } from '../../utils/handler'
import { requireUser } from '../../utils/require-user'

/** GET /api/session: who is signed in. */
export default defineHandler(async event => signedInOf(await requireUser(event)))
