import { getAuth } from '@/lib/auth/auth';

const handle = (request: Request): Promise<Response> => getAuth().handler(request);

export { handle as GET, handle as POST };
