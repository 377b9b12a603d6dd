/**
 * The field of a spinning sample seen from the molecule. With the rotor axis along the unit vector u and the laboratory tensor
 * Ry(angle) Rz(2 pi rate t) R T, it runs round the cone n(theta) = cos(angle) u + sin(angle) (-cos(theta) e1 + sin(theta) e2),
 * theta = 2 pi rate t, with e1, e2, u right-handed. A rotor phase adds to theta, so that its average is free of the choice of e1.
 */
export interface RotorCone {
  /** Writes the three vectors of the cone about `axis`: cos(angle) u, -sin(angle) e1, sin(angle) e2. */
  setAxis(axis: Float64Array): void;
  readonly along: Float64Array;
  readonly cosine: Float64Array;
  readonly sine: Float64Array;
}

export function rotorCone(angleDegrees: number): RotorCone {
  const angle = (angleDegrees * Math.PI) / 180;
  const [c, s] = [Math.cos(angle), Math.sin(angle)];
  const [along, cosine, sine] = [new Float64Array(3), new Float64Array(3), new Float64Array(3)];
  return {
    along,
    cosine,
    sine,
    setAxis(u) {
      // e1 = (k x u)/|k x u| for the axis k least along u, e2 = u x e1.
      const least =
        Math.abs(u[0]) < Math.abs(u[1])
          ? Math.abs(u[0]) < Math.abs(u[2])
            ? 0
            : 2
          : Math.abs(u[1]) < Math.abs(u[2])
            ? 1
            : 2;
      const [next, last] = [(least + 1) % 3, (least + 2) % 3];
      const length = Math.hypot(u[next], u[last]);
      // k x u has the components -u[last] along `next` and u[next] along `last`.
      const [p, q] = [-u[last] / length, u[next] / length];
      for (let i = 0; i < 3; i++) along[i] = c * u[i];
      cosine[least] = 0;
      cosine[next] = -s * p;
      cosine[last] = -s * q;
      sine[least] = s * (u[next] * q - u[last] * p);
      sine[next] = -s * u[least] * q;
      sine[last] = s * u[least] * p;
    },
  };
}

/** Fourier components of n.A.n round the cone: out = [mean, cos theta, sin theta, cos 2 theta, sin 2 theta]. */
export function coneHarmonics(a: Float64Array, { along: u, cosine: c, sine: s }: RotorCone, out: Float64Array): void {
  const [cc, ss] = [bilinear(a, c, c), bilinear(a, s, s)];
  out[0] = bilinear(a, u, u) + (cc + ss) / 2;
  out[1] = 2 * bilinear(a, u, c);
  out[2] = 2 * bilinear(a, u, s);
  out[3] = (cc - ss) / 2;
  out[4] = bilinear(a, c, s);
}

/** x.A.y of a symmetric A. */
function bilinear(a: Float64Array, x: Float64Array, y: Float64Array): number {
  return (
    a[0] * x[0] * y[0] +
    a[4] * x[1] * y[1] +
    a[8] * x[2] * y[2] +
    a[1] * (x[0] * y[1] + x[1] * y[0]) +
    a[2] * (x[0] * y[2] + x[2] * y[0]) +
    a[5] * (x[1] * y[2] + x[2] * y[1])
  );
}
