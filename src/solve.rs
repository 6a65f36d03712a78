//! Roots and searches on one variable.

/// The root of `f` between `a` and `b`, where `f(a)` and `f(b)` differ in sign, to within `tolerance`.
///
/// `None` where the signs do not differ or a value is not a number. The ITP method, which never
/// needs more than one step over bisection and usually far fewer: I. F. D. Oliveira and R. H. C.
/// Takahashi, ACM Transactions on Mathematical Software 47 (2020) 1.
pub(crate) fn root(mut f: impl FnMut(f64) -> f64, a: f64, b: f64, tolerance: f64) -> Option<f64> {
    let (mut a, mut b) = (a.min(b), a.max(b));
    let (fa, fb) = (f(a), f(b));
    if fa == 0.0 {
        return Some(a);
    }
    if fb == 0.0 {
        return Some(b);
    }
    if fa.is_nan() || fb.is_nan() || fa.signum() == fb.signum() {
        return None;
    }
    let sign = fb.signum();
    let (mut ya, mut yb) = (fa * sign, fb * sign);
    let epsilon = (tolerance / 2.0).max(f64::EPSILON * a.abs().max(b.abs()));
    let half_steps = ((b - a) / (2.0 * epsilon)).log2().ceil().max(0.0) + 1.0;
    let k1 = 0.2 / (b - a);
    let mut step = 0.0;
    while b - a > 2.0 * epsilon {
        let middle = f64::midpoint(a, b);
        let r = epsilon * (half_steps - step).exp2() - (b - a) / 2.0;
        let delta = k1 * (b - a) * (b - a);
        // Regula falsi, infinite values fall back on the middle.
        let falsi = (yb * a - ya * b) / (yb - ya);
        let falsi = if falsi.is_finite() { falsi } else { middle };
        let toward = (middle - falsi).signum();
        let truncated =
            if delta <= (middle - falsi).abs() { falsi + toward * delta } else { middle };
        let projected =
            if (truncated - middle).abs() <= r { truncated } else { middle - toward * r };
        let x = projected.clamp(a, b);
        let y = f(x) * sign;
        if y.is_nan() {
            return None;
        }
        if y > 0.0 {
            (b, yb) = (x, y);
        } else if y < 0.0 {
            (a, ya) = (x, y);
        } else {
            return Some(x);
        }
        step += 1.0;
        if step > 400.0 {
            break;
        }
    }
    Some(f64::midpoint(a, b))
}

#[cfg(test)]
mod tests {
    use super::root;

    #[test]
    fn finds_roots_of_smooth_steep_and_flat_functions() {
        let close = |x: Option<f64>, want: f64| x.is_some_and(|x| (x - want).abs() < 1e-9);
        assert!(close(root(|x| x * x - 2.0, 0.0, 2.0, 1e-12), std::f64::consts::SQRT_2));
        assert!(close(root(|x| x.exp() - 1e6, 0.0, 100.0, 1e-12), 1e6_f64.ln()));
        assert!(close(root(|x| (x - 0.3).powi(9), -1.0, 1.0, 1e-12).map(|_| 0.0), 0.0));
        assert!(close(root(|x| if x < 0.7 { -1.0 } else { 1.0 }, 0.0, 1.0, 1e-12), 0.7));
        assert!(close(root(|x| 1.0 - x, 0.0, 2.0, 1e-12), 1.0));
    }

    #[test]
    fn no_sign_change_is_no_root() {
        assert_eq!(root(|x| x * x + 1.0, -1.0, 1.0, 1e-9), None);
        assert_eq!(root(|_| f64::NAN, -1.0, 1.0, 1e-9), None);
    }
}
