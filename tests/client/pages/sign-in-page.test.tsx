import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { render, screen } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { MemoryRouter, Route, Routes } from 'react-router-dom';
import { afterEach, describe, expect, it, vi } from 'vitest';
import { SignInPage } from '../../../client/src/pages/sign-in/sign-in-page.tsx';

const account = {
  id: '0191f0c2-6f5e-7a31-8c54-3f1d2b9a7e10',
  email: 'labeller-a@vennory.example',
  name: 'Labeller A',
  siteAdmin: false,
  mailsRunEnd: true,
  createdAt: '2025-09-04T12:00:00Z',
};

/** Answers GET and POST /session; other requests fail the test. */
function stubSession(post: () => Response) {
  const calls: { method: string; body: unknown }[] = [];
  vi.stubGlobal('fetch', async (url: string, init: RequestInit) => {
    if (url !== '/api/v1/session') throw new Error(`unexpected request to ${url}`);
    calls.push({ method: init.method ?? 'GET', body: init.body ? JSON.parse(String(init.body)) : null });
    return init.method === 'POST' ? post() : Response.json({ account: null });
  });
  return calls;
}

function show(address = '/sign-in?to=%2Fprojects%2Fp1%2Fruns') {
  const client = new QueryClient({ defaultOptions: { queries: { retry: false } } });
  render(
    <QueryClientProvider client={client}>
      <MemoryRouter initialEntries={[address]}>
        <Routes>
          <Route path="/sign-in" element={<SignInPage />} />
          <Route path="/projects/p1/runs" element={<p>The runs page</p>} />
          <Route path="/projects" element={<p>The project list</p>} />
        </Routes>
      </MemoryRouter>
    </QueryClientProvider>,
  );
}

async function fillIn(email: string, password: string) {
  if (email) await userEvent.type(screen.getByLabelText('E-mail'), email);
  if (password) await userEvent.type(screen.getByLabelText('Password'), password);
  await userEvent.click(screen.getByRole('button', { name: 'Sign in' }));
}

afterEach(() => vi.unstubAllGlobals());

describe('the sign-in page', () => {
  it('signs in and goes back to where the reader was stopped', async () => {
    const calls = stubSession(() => Response.json({ account }));
    show();
    await fillIn('Labeller-A@vennory.example', 'a long enough password');
    expect(await screen.findByText('The runs page')).toBeInTheDocument();
    expect(calls.find((call) => call.method === 'POST')?.body).toEqual({
      email: 'labeller-a@vennory.example',
      password: 'a long enough password',
    });
  });

  it('never leads to another site', async () => {
    stubSession(() => Response.json({ account }));
    show('/sign-in?to=https%3A%2F%2Felsewhere.example');
    await fillIn('labeller-a@vennory.example', 'a long enough password');
    expect(await screen.findByText('The project list')).toBeInTheDocument();
  });

  it('asks for what is missing before it asks the server', async () => {
    const calls = stubSession(() => Response.json({ account }));
    show();
    await fillIn('not an address', '');
    expect(await screen.findByText('This is not an e-mail address.')).toBeInTheDocument();
    expect(screen.getByLabelText('Password')).toHaveAccessibleDescription('Type your password.');
    expect(calls.some((call) => call.method === 'POST')).toBe(false);
  });

  it('says why the server refused, and stays', async () => {
    stubSession(() =>
      Response.json(
        { type: 'about:blank', title: 'E-mail or password is wrong', status: 401, code: 'wrong-password' },
        { status: 401 },
      ),
    );
    show();
    await fillIn('labeller-a@vennory.example', 'something else');
    expect(await screen.findByRole('alert')).toHaveTextContent('E-mail or password is wrong');
    expect(screen.getByLabelText('E-mail')).toHaveValue('labeller-a@vennory.example');
  });
});
