'use client'

import { zodResolver } from '@hookform/resolvers/zod'
import { useEffect, useRef, useState } from 'react'
import { type Control, Controller, type FieldErrors, useForm } from 'react-hook-form'
import { Field } from '@/components/ui/field'
import { Key } from '@/components/ui/key'
import { browserShopLine, type ShopLine, type SignInProblem } from '@/lib/ports/shop-line'
import { arrive } from './arrive'
import { homeOf, pathAskedFor } from './home-of'
import { type SignInForm as Fields, signInForm } from './sign-in.schema'
import { signInSentence } from './sign-in-sentences'

const LEAVING = { email: '', password: '' }

type Props = { line?: ShopLine; goTo?: (path: string) => void }

const leaveTo = (path: string) => window.location.assign(path)

/** E-mail and password. The password is dropped from the form as soon as it was sent. */
export function SignInForm({ line = browserShopLine, goTo = leaveTo }: Props) {
  const [problem, setProblem] = useState<SignInProblem | null>(null)
  const box = useRef<HTMLFormElement>(null)
  const alert = useRef<HTMLParagraphElement>(null)
  const { control, handleSubmit, resetField, formState } = useForm<Fields>({
    resolver: zodResolver(signInForm),
    defaultValues: LEAVING,
    shouldFocusError: false,
  })
  useEffect(() => {
    if (problem) alert.current?.focus()
  }, [problem])

  async function send({ email, password }: Fields) {
    setProblem(null)
    const answer = await line.signIn(email, password)
    resetField('password')
    if (!answer.ok) return setProblem(answer.problem)
    const actor = await arrive(line)
    if (!actor) return setProblem({ kind: 'serverTrouble' })
    goTo(pathAskedFor(window.location.search) ?? homeOf(actor.roles))
  }

  function showFirst(errors: FieldErrors<Fields>) {
    const first = errors.email ? 'email' : 'password'
    const input = box.current?.elements.namedItem(first)
    if (input instanceof HTMLElement) input.focus()
  }

  const busy = formState.isSubmitting
  return (
    <form
      ref={box}
      method="post"
      noValidate
      className="grid gap-5"
      onSubmit={(event) => void handleSubmit(send, showFirst)(event)}
    >
      <p
        ref={alert}
        role="alert"
        tabIndex={-1}
        className={problem ? 'border-2 border-nogo px-3 py-2 font-bold text-nogo' : 'hidden'}
      >
        {problem ? signInSentence(problem) : ''}
      </p>
      <Box control={control} name="email" label="E-mail" type="email" autoComplete="username" />
      <Box
        control={control}
        name="password"
        label="Password"
        type="password"
        autoComplete="current-password"
      />
      <Key kind="main" type="submit" disabled={busy}>
        {busy ? 'Signing in' : 'Sign in'}
      </Key>
    </form>
  )
}

type BoxProps = {
  control: Control<Fields>
  name: keyof Fields
  label: string
  type: 'email' | 'password'
  autoComplete: string
}

function Box({ control, name, ...rest }: BoxProps) {
  return (
    <Controller
      control={control}
      name={name}
      render={({ field, fieldState }) => (
        <Field
          {...rest}
          name={name}
          autoCapitalize="off"
          value={field.value}
          onChange={field.onChange}
          error={fieldState.error?.message ?? null}
        />
      )}
    />
  )
}
