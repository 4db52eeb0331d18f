//! Every number as it is written: one place, one minus sign, never −0.

use plumbfold_core::{angle::Angle, bounds::Unit};

/// A number with a fixed count of decimals, a true minus sign, and no minus before zero.
#[must_use]
pub fn number(value: f64, decimals: usize) -> String {
    if !value.is_finite() {
        return "–".to_owned();
    }
    let plain = format!("{value:.decimals$}");
    match plain.strip_prefix('-') {
        Some(rest) if rest.chars().all(|c| c == '0' || c == '.') => rest.to_owned(),
        Some(rest) => format!("−{rest}"),
        None => plain,
    }
}

/// A number with at most `decimals` decimals, trailing zeros dropped: `61`, `61.5`.
#[must_use]
pub fn short(value: f64, decimals: usize) -> String {
    let n = number(value, decimals);
    if n.contains('.') { n.trim_end_matches('0').trim_end_matches('.').to_owned() } else { n }
}

/// With its sign always shown: `+7`, `−3`, `0`.
#[must_use]
pub fn signed(value: f64, decimals: usize) -> String {
    let n = number(value, decimals);
    let zero = n.chars().all(|c| c == '0' || c == '.');
    if value > 0.0 && !zero { format!("+{n}") } else { n }
}

/// An angle to 1°: `71°`.
#[must_use]
pub fn deg(a: Angle) -> String {
    format!("{}°", number(a.deg(), 0))
}

/// An angle as spoken of a depth, to 5°: `75°`.
#[must_use]
pub fn deg_spoken(a: Angle) -> String {
    format!("{}°", number((a.deg() / 5.0).round() * 5.0, 0))
}

/// A depth up to which something holds, to 5° and never more than it is: `75°` for 78°.
#[must_use]
pub fn deg_up_to(a: Angle) -> String {
    format!("{}°", number((a.deg() / 5.0 + 1e-9).floor() * 5.0, 0))
}

/// A change of an angle: `+7°`.
#[must_use]
pub fn deg_signed(a: Angle) -> String {
    format!("{}°", signed(a.deg(), 0))
}

/// A length to 1 cm, from metres: `27 cm`.
#[must_use]
pub fn cm(m: f64) -> String {
    format!("{} cm", number(m * 100.0, 0))
}

/// A length measured, to 1 mm, from metres: `39.8 cm`.
#[must_use]
pub fn cm_fine(m: f64) -> String {
    format!("{} cm", number(m * 100.0, 1))
}

/// A small length, from metres: `20 mm`.
#[must_use]
pub fn mm(m: f64) -> String {
    format!("{} mm", number(m * 1000.0, 0))
}

/// A mass: `61 kg`, `61.5 kg`.
#[must_use]
pub fn kg(kg: f64) -> String {
    format!("{} kg", short(kg, 1))
}

/// A moment to 1 N·m: `57 N·m`.
#[must_use]
pub fn nm(nm: f64) -> String {
    format!("{} N·m", number(nm, 0))
}

/// A share: `58 %`.
#[must_use]
pub fn percent(share: f64) -> String {
    format!("{} %", number(share * 100.0, 0))
}

/// Hip arm to knee arm: `2.1 : 1`; `–` where there is none.
#[must_use]
pub fn ratio(hip_to_knee: Option<f64>) -> String {
    hip_to_knee.map_or_else(|| "–".to_owned(), |r| format!("{} : 1", number(r, 1)))
}

/// A value with its unit, as a field or a slider shows it.
#[must_use]
pub fn value(v: f64, unit: Unit) -> String {
    let decimals = match unit {
        Unit::Cm | Unit::Kg => 1,
        Unit::Mm | Unit::Deg | Unit::Years | Unit::Percent => 0,
        Unit::One => 2,
    };
    format!("{}{}", number(v, decimals), unit.suffix())
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn there_is_no_minus_before_zero() {
        assert_eq!(number(-0.2, 0), "0");
        assert_eq!(number(-0.04, 1), "0.0");
        assert_eq!(number(-0.6, 0), "−1");
        assert_eq!(deg(Angle::from_deg(-0.3)), "0°");
        assert_eq!(cm(-0.004), "0 cm");
        assert_eq!(signed(-0.2, 0), "0");
        assert_eq!(signed(0.2, 0), "0");
    }

    #[test]
    fn signs_units_and_steps() {
        assert_eq!(deg(Angle::from_deg(-12.0)), "−12°");
        assert_eq!(deg_spoken(Angle::from_deg(76.2)), "75°");
        assert_eq!(deg_spoken(Angle::from_deg(77.6)), "80°");
        assert_eq!(deg_up_to(Angle::from_deg(79.9)), "75°");
        assert_eq!(deg_up_to(Angle::from_deg(80.0)), "80°");
        assert_eq!(deg_signed(Angle::from_deg(7.0)), "+7°");
        assert_eq!(cm(0.2749), "27 cm");
        assert_eq!(cm_fine(0.398), "39.8 cm");
        assert_eq!(mm(0.02), "20 mm");
        assert_eq!(kg(61.0), "61 kg");
        assert_eq!(kg(61.5), "61.5 kg");
        assert_eq!(nm(56.7), "57 N·m");
        assert_eq!(percent(0.58), "58 %");
        assert_eq!(ratio(Some(2.09)), "2.1 : 1");
        assert_eq!(ratio(None), "–");
        assert_eq!(value(12.0, Unit::Mm), "12 mm");
    }

    #[test]
    fn what_is_not_finite_is_a_dash() {
        for v in [f64::NAN, f64::INFINITY, f64::NEG_INFINITY] {
            assert_eq!(number(v, 1), "–");
        }
    }
}
