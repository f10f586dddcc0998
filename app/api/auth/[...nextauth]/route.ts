import NextAuth from 'next-auth';
import type { NextRequest } from 'next/server';
import { authOptions } from '@/lib/auth/options';
import { signInIdOf } from '@/lib/auth/session';
import { addressOf } from '@/lib/http/address';

const handler = async (request: NextRequest, context: { params: Promise<{ nextauth: string[] }> }): Promise<Response> =>
  (await NextAuth(
    request as never, // its types know only the Pages Router's request
    context as never,
    authOptions({ address: addressOf(request), userAgent: request.headers.get('user-agent') ?? '', previous: await signInIdOf(request.cookies) }),
  )) as Response;

export { handler as GET, handler as POST };
