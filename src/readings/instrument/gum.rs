//! Standard uncertainties and how they combine: JCGM 100 (GUM). Plain `f64`, any one unit.

/// Quotient of half-width and standard uncertainty of a rectangular distribution.
const ROOT_3: f64 = 1.732_050_807_568_877_2;
/// The same of a triangular distribution.
const ROOT_6: f64 = 2.449_489_742_783_178;

/// Standard uncertainty of a value that lies anywhere within ± `half_width`, all places alike (GUM 4.4.5, equation 7; 4.3.7).
#[must_use]
pub fn rectangular(half_width: f64) -> f64 {
    half_width.abs() / ROOT_3
}

/// Standard uncertainty of a value within ± `half_width` that favours the middle (GUM 4.3.9, 4.4.6).
#[must_use]
pub fn triangular(half_width: f64) -> f64 {
    half_width.abs() / ROOT_6
}

/// Standard uncertainty from the step of a digital display: 0.29 steps (GUM F.2.2.1).
#[must_use]
pub fn digital_step(step: f64) -> f64 {
    rectangular(0.5 * step)
}

/// Standard uncertainty of reading a needle to a quarter of a division. A quarter is common practice.
#[must_use]
pub fn needle_division(division: f64) -> f64 {
    rectangular(0.25 * division)
}

/// Combined standard uncertainty of independent parts (GUM 5.1.2): root of the sum of squares.
#[must_use]
pub fn combined(parts: &[f64]) -> f64 {
    parts.iter().map(|part| part * part).sum::<f64>().sqrt()
}

/// Effective degrees of freedom of a combined standard uncertainty (GUM G.4.1, Welch-Satterthwaite) from pairs of a part's
/// standard uncertainty and its degrees of freedom. Parts known to the limit have infinite ones. Infinite when no part has
/// finite ones.
#[must_use]
pub fn effective_degrees_of_freedom(parts: &[(f64, f64)]) -> f64 {
    let sum: f64 = parts.iter().map(|(u, _)| u * u).sum();
    let below: f64 = parts
        .iter()
        .filter(|(_, freedom)| freedom.is_finite())
        .map(|(u, freedom)| u.powi(4) / freedom)
        .sum();
    if below > 0.0 {
        sum * sum / below
    } else {
        f64::INFINITY
    }
}

/// Expanded uncertainty (GUM 6.2.1). A coverage factor of 2 covers about 95 % where there are many degrees of freedom.
#[must_use]
pub fn expanded(standard: f64, coverage_factor: f64) -> f64 {
    standard * coverage_factor
}

/// Coverage factors for 95 % by degrees of freedom (GUM Table G.2, t distribution).
const T_95: [(f64, f64); 26] = [
    (1.0, 12.71),
    (2.0, 4.30),
    (3.0, 3.18),
    (4.0, 2.78),
    (5.0, 2.57),
    (6.0, 2.45),
    (7.0, 2.36),
    (8.0, 2.31),
    (9.0, 2.26),
    (10.0, 2.23),
    (11.0, 2.20),
    (12.0, 2.18),
    (13.0, 2.16),
    (14.0, 2.14),
    (15.0, 2.13),
    (16.0, 2.12),
    (17.0, 2.11),
    (18.0, 2.10),
    (19.0, 2.09),
    (20.0, 2.09),
    (25.0, 2.06),
    (30.0, 2.04),
    (35.0, 2.03),
    (40.0, 2.02),
    (50.0, 2.01),
    (100.0, 1.984),
];

/// Coverage factor for 95 % (GUM Table G.2): the row at or under these degrees of freedom, 1.96 where they are infinite.
/// Fewer than one count as one.
#[must_use]
pub fn coverage_factor_95(degrees_of_freedom: f64) -> f64 {
    if degrees_of_freedom == f64::INFINITY {
        return 1.960;
    }
    T_95.iter()
        .rev()
        .find(|(row, _)| degrees_of_freedom >= *row)
        .map_or(12.71, |(_, factor)| *factor)
}
