import { Outlet } from 'react-router-dom';
import { Mark } from '../../theme/Mark';
import classes from './AuthLayout.module.css';
import { Threads } from './Threads';

/** The door: threads through their heddles on one side, a form on the other. */
export function AuthLayout() {
  return (
    <div className={classes.page}>
      <div className={classes.threads}>
        <Threads />
      </div>
      <main className={classes.main}>
        <div className={classes.brand}>
          <Mark size={36} />
          <span>Heddle</span>
        </div>
        <Outlet />
      </main>
    </div>
  );
}
