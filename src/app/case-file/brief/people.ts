import { ChangeDetectionStrategy, Component, computed, inject } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { type Assignment, endAssignment } from '#shared/contracts/cases';
import type { AssignRequest } from '../../cases/assign/assign-dialog';
import { caseRoleName } from '../../cases/case-role';
import { Api } from '../../core/api/api';
import { Messages } from '../../core/messages/messages';
import { Dialogs } from '../../ui/confirm-dialog/dialogs';
import { showDay } from '../../ui/dates/dates';
import { EmptyState } from '../../ui/empty-state/empty-state';
import { Icon } from '../../ui/icon/icon';
import { CurrentCase } from '../current-case';

/** Who has which role in the case, and what they declared. */
@Component({
  selector: 'app-people',
  imports: [EmptyState, Icon, MatButton],
  template: `
    @if (people().length > 0) {
      <ul class="rows">
        @for (person of people(); track person.id) {
          <li>
            <span>{{ person.name }}</span>
            <span class="muted small">
              {{ person.roleName }}{{ person.party === '' ? '' : ' for ' + person.party }}, since
              {{ person.since }}
            </span>
            @if (current.may().assign) {
              <button
                matButton
                type="button"
                class="push screen-only"
                [attr.aria-label]="
                  'End the assignment of ' + person.name + ' as ' + person.roleName
                "
                (click)="end(person)"
              >
                End …
              </button>
            }
            @if (person.declaration.conflict) {
              <span class="note small conflict">
                <ui-icon name="warning" /> Possible conflict declared:
                {{ person.declaration.statement }}
              </span>
            } @else {
              <span class="note small muted">
                No conflict declared: {{ person.declaration.statement }}
              </span>
            }
          </li>
        }
      </ul>
    } @else {
      <ui-empty-state text="Nobody is assigned yet.">
        The laboratory lead assigns people after they declared any conflict of interest.
      </ui-empty-state>
    }
    @if (current.may().assign) {
      <button matButton="outlined" type="button" class="screen-only" (click)="assign()">
        <ui-icon name="add" /> Assign a person
      </button>
    }
  `,
  styleUrl: './entry-list.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class People {
  private readonly api = inject(Api);
  private readonly dialogs = inject(Dialogs);
  private readonly messages = inject(Messages);
  protected readonly current = inject(CurrentCase);

  protected readonly people = computed(() => {
    const { assignments, parties } = this.current.file();
    return assignments.map((one) => ({
      ...one,
      roleName: caseRoleName(one.role),
      party: parties.find((party) => party.id === one.partyId)?.name ?? '',
      since: showDay(one.assignedAt.slice(0, 10)),
    }));
  });

  protected async assign(): Promise<void> {
    const led = this.current.file().assignments.some((one) => one.role === 'lead-investigator');
    const done = await this.dialogs.open<boolean>(
      async () => (await import('../../cases/assign/assign-dialog')).AssignDialog,
      {
        caseId: this.current.id(),
        role: led ? 'investigator' : 'lead-investigator',
        loads: [],
      } satisfies AssignRequest,
    );
    if (done) this.current.reload();
  }

  protected async end(person: Assignment): Promise<void> {
    const role = caseRoleName(person.role);
    const sure = await this.dialogs.confirm({
      title: `End the assignment of ${person.name}?`,
      text: `${person.name} then no longer acts as ${role} in this case. That they did so stays on record.`,
      yes: 'End the assignment',
    });
    if (!sure) return;
    try {
      await this.api.call(endAssignment, {
        params: { caseId: this.current.id(), assignmentId: person.id },
      });
      this.messages.done(`${person.name} no longer acts as ${role}.`);
      this.current.reload();
    } catch (error) {
      this.messages.fault(error);
    }
  }
}
