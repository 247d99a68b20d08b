/** The variable of a loop gain: s, or z for a sampled loop. */
export type ExpressionVariable = 's' | 'z'

/** The channel of a block as typed in G[output, input]: numbers from 1, or names. */
export interface BlockChannel {
  readonly output: string
  readonly input: string
}

/**
 * A loop gain as typed, after the syntax has been checked: nothing but numbers, the variable, named parameters, the four operations,
 * whole powers and exp of something linear in s; over blocks also their names and, since a bracket may close a hold there, brackets. `position` is the character (from 0) where the part stands.
 */
export type ExpressionNode
  = | { readonly kind: 'constant', readonly value: number, readonly position: number }
    | { readonly kind: 'parameter', readonly name: string, readonly position: number }
    | { readonly kind: 'variable', readonly variable: ExpressionVariable, readonly position: number }
    | { readonly kind: 'block', readonly name: string, readonly channel: BlockChannel | null, readonly position: number }
    | { readonly kind: 'brackets', readonly content: ExpressionNode, readonly position: number }
    | { readonly kind: 'add' | 'subtract' | 'multiply' | 'divide', readonly left: ExpressionNode, readonly right: ExpressionNode, readonly position: number }
    | { readonly kind: 'negate', readonly operand: ExpressionNode, readonly position: number }
    | { readonly kind: 'power', readonly base: ExpressionNode, readonly exponent: number, readonly position: number }
  /** exp(argument); the argument is linear in s by its form, its sign is known once the parameters are */
    | { readonly kind: 'exponential', readonly argument: ExpressionNode, readonly position: number }
