//! Bracketed roots and minima in one variable.

/// A root between `a` and `b` by the ITP method (Oliveira and Takahashi 2020, ACM TOMS 47:5),
/// which needs no more steps than bisection. Where the ends do not differ in sign, the end nearest
/// to zero. Ends within `tol` (absolute), at most 80 evaluations.
pub fn bracketed(f: impl Fn(f64) -> f64, a: f64, b: f64, tol: f64) -> f64 {
    let (fa, fb) = (f(a), f(b));
    bracketed_from(f, (a, fa), (b, fb), tol)
}

/// [`bracketed`] with the ends already known.
pub fn bracketed_from(
    f: impl Fn(f64) -> f64,
    (mut a, mut fa): (f64, f64),
    (mut b, mut fb): (f64, f64),
    tol: f64,
) -> f64 {
    if fa == 0.0 {
        return a;
    }
    if fb == 0.0 {
        return b;
    }
    if (fa > 0.0) == (fb > 0.0) || !fa.is_finite() || !fb.is_finite() {
        return bisect_sign(f, (a, fa), (b, fb), tol);
    }
    let width = (b - a).abs();
    let n_half = ((width / (2.0 * tol)).log2().ceil()).max(0.0);
    let n_max = (n_half + 1.0).min(80.0) as i32;
    let k1 = 0.2 / width;
    for j in 0..80 {
        if (b - a).abs() <= 2.0 * tol {
            break;
        }
        let mid = 0.5 * (a + b);
        let r = tol * f64::from(2).powi((n_max - j).max(0)) - 0.5 * (b - a).abs();
        let delta = k1 * (b - a).powi(2);
        let falsi = (fb * a - fa * b) / (fb - fa);
        let sigma = (mid - falsi).signum();
        let trunc = if delta <= (mid - falsi).abs() { falsi + sigma * delta } else { mid };
        let x = if (trunc - mid).abs() <= r { trunc } else { mid - sigma * r.max(0.0) };
        let x = x.clamp(a.min(b), a.max(b));
        let y = f(x);
        if y == 0.0 {
            return x;
        }
        if (y > 0.0) == (fa > 0.0) {
            (a, fa) = (x, y);
        } else {
            (b, fb) = (x, y);
        }
    }
    if fa.abs() < fb.abs() { a } else { b }
}

/// Where an end is infinite: halving on the sign alone. Without a change of sign, the end nearest zero.
fn bisect_sign(f: impl Fn(f64) -> f64, (mut a, fa): (f64, f64), (mut b, fb): (f64, f64), tol: f64) -> f64 {
    if (fa > 0.0) == (fb > 0.0) {
        return if fa.abs() <= fb.abs() { a } else { b };
    }
    for _ in 0..80 {
        if (b - a).abs() <= tol {
            break;
        }
        let mid = 0.5 * (a + b);
        if (f(mid) > 0.0) == (fa > 0.0) {
            a = mid;
        } else {
            b = mid;
        }
    }
    if fa.is_finite() { a } else { b }
}

/// Improves a root known to a few digits by secant steps that stay in the bracket.
pub fn polish(f: impl Fn(f64) -> f64, guess: f64, low: f64, high: f64) -> f64 {
    let (mut x0, mut x1) = (guess, (guess + 1e-7).min(high));
    if x1 == x0 {
        x1 = (guess - 1e-7).max(low);
    }
    let (mut f0, mut f1) = (f(x0), f(x1));
    let (mut best, mut least) = (x0, f0.abs());
    for _ in 0..4 {
        if f1 == f0 {
            break;
        }
        let x2 = (x1 - f1 * (x1 - x0) / (f1 - f0)).clamp(low, high);
        (x0, f0) = (x1, f1);
        (x1, f1) = (x2, f(x2));
        if f1.abs() < least {
            (best, least) = (x1, f1.abs());
        } else {
            break;
        }
    }
    best
}

/// The least of a function of one dip between `a` and `b`, by Brent's method (Brent 1973, ch. 5):
/// place within `tol`, at most 60 evaluations. Returns place and value, ends included.
pub fn least(f: impl Fn(f64) -> f64, a: f64, b: f64, tol: f64) -> (f64, f64) {
    const GOLD: f64 = 0.381_966_011_250_105_2;
    let (mut a, mut b) = (a.min(b), a.max(b));
    let mut best = (a, f(a));
    let end = (b, f(b));
    if end.1 < best.1 {
        best = end;
    }
    let mut x = a + GOLD * (b - a);
    let (mut w, mut v) = (x, x);
    let mut fx = f(x);
    let (mut fw, mut fv) = (fx, fx);
    let (mut d, mut e) = (0.0_f64, 0.0_f64);
    for _ in 0..60 {
        let m = 0.5 * (a + b);
        let t = tol + 1e-15 * x.abs();
        if (x - m).abs() <= 2.0 * t - 0.5 * (b - a) {
            break;
        }
        let mut golden = true;
        if e.abs() > t {
            let r = (x - w) * (fx - fv);
            let q0 = (x - v) * (fx - fw);
            let mut p = (x - v) * q0 - (x - w) * r;
            let mut q = 2.0 * (q0 - r);
            if q > 0.0 {
                p = -p;
            }
            q = q.abs();
            if p.abs() < (0.5 * q * e).abs() && p > q * (a - x) && p < q * (b - x) {
                e = d;
                d = p / q;
                let u = x + d;
                if u - a < 2.0 * t || b - u < 2.0 * t {
                    d = if x < m { t } else { -t };
                }
                golden = false;
            }
        }
        if golden {
            e = if x < m { b - x } else { a - x };
            d = GOLD * e;
        }
        let u = x + if d.abs() >= t { d } else { t.copysign(d) };
        let fu = f(u);
        if fu <= fx {
            if u < x {
                b = x
            } else {
                a = x
            }
            (v, fv) = (w, fw);
            (w, fw) = (x, fx);
            (x, fx) = (u, fu);
        } else {
            if u < x {
                a = u
            } else {
                b = u
            }
            if fu <= fw || w == x {
                (v, fv) = (w, fw);
                (w, fw) = (u, fu);
            } else if fu <= fv || v == x || v == w {
                (v, fv) = (u, fu);
            }
        }
    }
    if fx < best.1 { (x, fx) } else { best }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn roots_and_minima_of_known_functions() {
        assert!((bracketed(|x| x * x - 2.0, 0.0, 2.0, 1e-13) - 2f64.sqrt()).abs() < 1e-12);
        assert!((bracketed(|x| x.cos() - x, 0.0, 1.0, 1e-13) - 0.739_085_133_215_160_6).abs() < 1e-12);
        assert_eq!(bracketed(|x| x + 1.0, 0.0, 1.0, 1e-12), 0.0);
        let (x, f) = least(|x| (x - 0.3) * (x - 0.3) + 1.0, 0.0, 1.0, 1e-9);
        assert!((x - 0.3).abs() < 1e-6 && (f - 1.0).abs() < 1e-12);
        assert_eq!(least(|x| x, 0.0, 1.0, 1e-9).0, 0.0);
        assert!((polish(|x| x * x - 2.0, 1.414, 0.0, 2.0) - 2f64.sqrt()).abs() < 1e-12);
    }
}
