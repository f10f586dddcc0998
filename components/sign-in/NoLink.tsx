import { LinkButton } from '@/components/ui/Button';

/** A page that is of no use without the secret of its link. */
export function NoLink({ what }: { what: string }) {
  return (
    <div className="flex flex-col items-start gap-3">
      <h1 className="type-head">This link is not whole</h1>
      <p className="type-body">Open {what} from the mail again, the whole of the address. Nothing was changed.</p>
      <LinkButton href="/sign-in">To the sign-in page</LinkButton>
    </div>
  );
}
