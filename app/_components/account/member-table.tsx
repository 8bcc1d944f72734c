/** The members with their roles. E-mail addresses are there for owners only. */
import { formatDay } from '@/app/_lib/locale';
import type { MemberRow } from '@/lib/services/list-members';
import styles from './member-table.module.css';

export function MemberTable({ members }: { members: MemberRow[] }) {
  const hasEmail = members.some((member) => member.email !== null);
  return (
    // biome-ignore lint/a11y/noNoninteractiveTabindex: a frame that scrolls must be reachable by keyboard
    <section className={styles.scroller} aria-label="Members" tabIndex={0}>
      <table className={styles.table}>
        <thead>
          <tr>
            <th scope="col">Name</th>
            <th scope="col">Role</th>
            {hasEmail ? <th scope="col">E-mail address</th> : null}
            <th scope="col">Since</th>
          </tr>
        </thead>
        <tbody>
          {members.map((member) => (
            <tr key={member.userId}>
              <th scope="row">{member.name}</th>
              <td>{member.role}</td>
              {hasEmail ? <td>{member.email}</td> : null}
              <td>{formatDay(member.joinedAt)}</td>
            </tr>
          ))}
        </tbody>
      </table>
    </section>
  );
}
