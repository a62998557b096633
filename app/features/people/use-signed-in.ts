import { useQueryClient } from '@tanstack/react-query';
import { useNavigate } from 'react-router-dom';
import { paths } from '../../lib/paths.ts';

/** After signing in or out: forgets what was known of another person and goes on. */
export function useSignedIn() {
  const queryClient = useQueryClient();
  const navigate = useNavigate();
  return async (to: string = paths.today()) => {
    queryClient.clear();
    // Only addresses of our own: a link from outside must not lead a person away after signing in.
    await navigate(to.startsWith('/') && !to.startsWith('//') ? to : paths.today(), { replace: true });
  };
}
