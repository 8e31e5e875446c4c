import { answerSignIn } from '@/lib/auth/answer-sign-in';

export const GET = answerSignIn;
export const POST = answerSignIn;
