import NextAuth from 'next-auth';
import type { NextRequest } from 'next/server';
import { authOptions } from '@/lib/auth/options';
import { signInIdOf } from '@/lib/auth/session';
import { addressOf } from '@/lib/http/address';
import { withOrigin } from '@/lib/origin';

const handler = async (request: NextRequest, context: { params: Promise<{ nextauth: string[] }> }): Promise<Response> => {
  const address = addressOf(request);
  const options = authOptions({ address, userAgent: request.headers.get('user-agent') ?? '', previous: await signInIdOf(request.cookies) });
  // Its types know only the Pages Router's request.
  return withOrigin({ address, means: 'sign-in' }, () => NextAuth(request as never, context as never, options)) as Promise<Response>;
};

export { handler as GET, handler as POST };
