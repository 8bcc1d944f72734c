/** Prints the one-time set-up link of the owner, or nothing once there is an owner. The launcher runs it at each start. */
import { createOwnerSetupLink } from '../services/create-owner-setup-link';
import { closePrisma } from '../store/client';

const link = await createOwnerSetupLink();
if (link !== null) console.log(link);
await closePrisma();
