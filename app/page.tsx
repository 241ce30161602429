import { redirect } from 'next/navigation';

/** The door leads to the bench. */
export default function Door() {
  redirect('/bench');
}
