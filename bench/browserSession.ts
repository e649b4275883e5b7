/** Signs in as a browser does and gives the cookie that later requests send. */
export async function openBrowserSession(url: string, email: string, password: string): Promise<string> {
  const start = await fetch(`${url}/api/session`)
  const { csrfToken } = (await start.json()) as { csrfToken: string }
  const signedIn = await fetch(`${url}/api/session`, {
    method: 'POST',
    headers: { 'Content-Type': 'application/json', 'X-CSRF-Token': csrfToken, cookie: cookieOf(start) },
    body: JSON.stringify({ email, password }),
  })
  if (!signedIn.ok) throw new Error(`The benchmark could not sign in: ${await signedIn.text()}`)
  return cookieOf(signedIn)
}

function cookieOf(response: Response): string {
  return response.headers
    .getSetCookie()
    .map((cookie) => cookie.split(';')[0]!)
    .join('; ')
}
