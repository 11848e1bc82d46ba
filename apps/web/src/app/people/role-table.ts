import { ChangeDetectionStrategy, Component } from '@angular/core';
import { PERMISSIONS, roleMay, ROLES } from '@riseback/contracts';
import { PERMISSION_HEADS, roleName } from './role-words';

/** What each role may do, from the very table that the server decides by. */
@Component({
  selector: 'app-role-table',
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <div class="scroll" tabindex="0" role="region" aria-label="Table of roles">
      <table>
        <thead>
          <tr>
            <th scope="col">Role</th>
            @for (head of heads; track head) {
              <th scope="col">{{ head }}</th>
            }
          </tr>
        </thead>
        <tbody>
          @for (row of rows; track row.name) {
            <tr>
              <th scope="row">{{ row.name }}</th>
              @for (may of row.may; track $index) {
                <td>
                  @if (may) {
                    <svg viewBox="0 0 14 14" width="14" height="14" aria-hidden="true" focusable="false">
                      <path d="m2.5 7.4 3 3 6-7" />
                    </svg>
                    <span class="rb-visually-hidden">yes</span>
                  } @else {
                    <span class="no">no</span>
                  }
                </td>
              }
            </tr>
          }
        </tbody>
      </table>
    </div>
    <p>Nobody signs a revision that they edited or submitted themselves, whatever their role.</p>
  `,
  styleUrl: './role-table.scss',
})
export class RoleTable {
  protected readonly heads = PERMISSIONS.map((permission) => PERMISSION_HEADS[permission]);
  protected readonly rows = ROLES.map((role) => ({
    name: roleName(role),
    may: PERMISSIONS.map((permission) => roleMay(role, permission)),
  }));
}
