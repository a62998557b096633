import { useQuery } from '@tanstack/react-query';
import { api } from '../../lib/api.ts';
import { Button } from '../../ui/button.tsx';

interface DemoAccount {
  readonly name: string;
  readonly signInName: string;
  readonly password: string;
  readonly what: string;
}

const isDemo = document.documentElement.dataset['demo'] !== undefined;

/** In the demo only: one press fills in a person of each role. */
export function DemoAccounts({ onChoose }: { readonly onChoose: (name: string, password: string) => void }) {
  const accounts = useQuery({
    queryKey: ['demo-accounts'],
    queryFn: ({ signal }) => api.get<readonly DemoAccount[]>('/api/demo/accounts', { signal }),
    enabled: isDemo,
    retry: false,
  });
  if (!accounts.data) return null;
  return (
    <section className="join" aria-label="Try it as">
      <p className="flabel">This is a demo. Try it as</p>
      <ul className="demo-people">
        {accounts.data.map((account) => (
          <li key={account.signInName} className="small">
            <Button kind="quiet" small onClick={() => onChoose(account.signInName, account.password)}>
              {account.name}
            </Button>
            <span className="muted">{account.what}</span>
          </li>
        ))}
      </ul>
    </section>
  );
}
