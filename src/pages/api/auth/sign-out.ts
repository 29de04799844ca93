import { signOut } from '@/lib/server/auth';
import { openRoute } from '@/lib/server/http';

export const POST = openRoute((call) => signOut(call));
