/** Why the plan is refused, beside the part it is refused for; seen also while that part is folded. */
export function Faults({ messages }: { messages: string[] }) {
  return messages.map((message) => (
    <p key={message} className="field-error">
      {message}
    </p>
  ));
}
