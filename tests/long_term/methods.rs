//! Laws of whole methods, on one tendon as a method sees it.

use std::sync::LazyLock;

use crate::sweep::no_jump;
use proptest::prelude::*;
use tautplan::job::LongTermMethod::{self, Aci423, As3600, Bs8110, Direct, En1992};
use tautplan::job::{Job, LongTerm};
use tautplan::losses::Steel;
use tautplan::losses::long_term::{Case, Lost, Method, NoLoss, Place, Turn, When};

const PUBLISHED: [LongTermMethod; 4] = [En1992, Aci423, Bs8110, As3600];

fn job() -> LongTerm {
    // A whole default job compiles its patterns: once is enough.
    static JOB: LazyLock<LongTerm> = LazyLock::new(|| {
        let mut job = Job::default().long_term;
        job.published.basic_relaxation = Some(0.02);
        job.published.relaxation_stress_factor = Some(1.1);
        job
    });
    JOB.clone()
}

fn case() -> Case {
    Case {
        steel: Steel {
            area_mm2: 493.5,
            strength_mpa: 1860.0,
            modulus_mpa: 195_000.0,
        },
        concrete_stress_mpa: 1.6,
        steel_ratio: 0.0013,
        notional_thickness_mm: Some(220.0),
        thickness_given: false,
        turn: Turn {
            tendons: 40.0,
            after: None,
        },
        mean: Place {
            lockoff_mpa: 1220.0,
            eccentricity: 0.5,
        },
        most_eccentricity: 1.5,
    }
}

fn lost(method: LongTermMethod, job: &LongTerm, case: &Case, when: When) -> Option<Lost> {
    let made = Method::new(method, job, case, when).ok()?;
    Some(made.at(case.mean))
}

/// All that is lost in the end.
fn all_mpa(method: LongTermMethod, job: &LongTerm, case: &Case) -> Option<f64> {
    Some(lost(method, job, case, When::Final)?.all_mpa())
}

proptest! {
    #![proptest_config(ProptestConfig { failure_persistence: None, cases: 200, ..ProptestConfig::default() })]

    #[test]
    fn loss_grows_with_the_concrete_stress(stress in 0.2..4.0, more in 0.0..1.0, eccentricity in 0.0..1.5) {
        for method in PUBLISHED.into_iter().chain([Direct]) {
            let of = |stress: f64| {
                let mut case = case();
                case.concrete_stress_mpa = stress;
                case.steel_ratio = stress / case.mean.lockoff_mpa;
                case.mean.eccentricity = eccentricity;
                let lost = lost(method, &job(), &case, When::Final).expect("covered");
                [lost.shortening_mpa, lost.creep_mpa, lost.all_mpa()]
            };
            let (less, greater) = (of(stress), of(stress + more));
            for (a, b) in less.into_iter().zip(greater) {
                prop_assert!(a <= b + 1e-12, "{method:?}: {a} {b}");
            }
        }
    }

    #[test]
    fn relaxation_grows_with_the_strands_stress(lockoff in 1120.0..1300.0, more in 0.0..80.0) {
        for method in PUBLISHED.into_iter().chain([Direct]) {
            let of = |lockoff: f64| {
                let mut case = case();
                case.mean.lockoff_mpa = lockoff;
                lost(method, &job(), &case, When::Final).expect("covered").relaxation_mpa
            };
            prop_assert!(of(lockoff) <= of(lockoff + more) + 1e-12, "{method:?}");
        }
    }

    #[test]
    fn loss_grows_with_time(days in 1.0..10_000.0, more in 1.0..5_000.0) {
        for method in [En1992, As3600] {
            let of = |days: f64| {
                let when = When::Age(job().published.stressing_days + days);
                lost(method, &job(), &case(), when).expect("covered").all_mpa()
            };
            prop_assert!(of(days) <= of(days + more), "{method:?}");
        }
    }

    #[test]
    fn a_working_ends_in_the_loss(stress in 0.2..4.0, lockoff in 1120.0..1400.0, eccentricity in 0.0..1.5, bonded: bool) {
        let mut case = case();
        case.concrete_stress_mpa = stress;
        case.mean = Place { lockoff_mpa: lockoff, eccentricity };
        let mut job = job();
        job.published.bonded = bonded;
        for method in PUBLISHED.into_iter().chain([Direct]) {
            let made = Method::new(method, &job, &case, When::Final).expect("covered");
            let lost = made.at(case.mean);
            let lines = made.equations(case.mean);
            let shown = |symbols: &[&str]| lines.iter().rev().find(|line| symbols.contains(&line.symbol)).map(|line| line.value);
            for (symbols, value) in [
                (&["shortening", "Delta P_el/A_p"], lost.shortening_mpa),
                (&["shrinkage", "shrinkage"], lost.shrinkage_mpa),
                (&["creep", "creep"], lost.creep_mpa),
                (&["relaxation", "relaxation"], lost.relaxation_mpa),
            ] {
                let found = shown(symbols).expect("the working shows each loss");
                prop_assert!((found - value).abs() <= 1e-9 * value.abs().max(1.0), "{method:?} {symbols:?}");
            }
        }
    }
}

/// A variable of the job or of the tendon, to be swept.
type Set = fn(&mut LongTerm, &mut Case, f64);

#[test]
fn no_method_jumps_as_its_inputs_change() {
    let sweeps: [(&str, (f64, f64), Set); 9] = [
        ("RH", (40.0, 100.0), |job, _, x| job.published.humidity = x),
        ("thickness", (100.0, 400.0), |_, case, x| {
            case.notional_thickness_mm = Some(x);
        }),
        ("age at stressing", (4.0, 28.0), |job, _, x| {
            job.published.stressing_days = x;
        }),
        ("strength at stressing", (16.0, 30.0), |job, _, x| {
            job.published.strength_at_stressing_mpa = x;
        }),
        ("stress", (0.0, 5.0), |_, case, x| {
            case.concrete_stress_mpa = x;
        }),
        ("lock-off", (1120.0, 1400.0), |_, case, x| {
            case.mean.lockoff_mpa = x;
        }),
        ("eccentricity", (0.0, 1.5), |_, case, x| {
            case.mean.eccentricity = x;
        }),
        ("balanced share", (0.3, 2.0), |job, _, x| {
            job.published.balanced_share = x;
        }),
        ("share at stressing", (0.0, 1.0), |job, _, x| {
            job.published.load_share_at_stressing = x;
        }),
    ];
    for method in PUBLISHED {
        for (name, range, set) in &sweeps {
            let of = |x: f64| {
                let (mut job, mut case) = (job(), case());
                set(&mut job, &mut case, x);
                all_mpa(method, &job, &case)
            };
            // What a method does not look at does not move it either.
            let moves = of(range.0) != of(f64::midpoint(range.0, range.1));
            if moves {
                no_jump(&format!("{method:?}, {name}"), *range, 1000, of);
            } else {
                assert!(of(range.1).is_some(), "{method:?}, {name}");
            }
        }
    }
    // Strength at 28 days: AS 3600's modulus has a jump of its own between 37 and 38 MPa.
    for method in [En1992, Aci423, Bs8110] {
        no_jump(&format!("{method:?}, strength"), (20.0, 48.0), 1000, |x| {
            let mut job = job();
            job.published.strength_mpa = x;
            all_mpa(method, &job, &case())
        });
    }
}

#[test]
fn an_unbonded_tendon_does_not_look_at_eccentricity_but_below_the_line() {
    let mut job = job();
    job.published.bonded = false;
    for method in PUBLISHED {
        let of = |eccentricity: f64| {
            let mut case = case();
            case.mean.eccentricity = eccentricity;
            lost(method, &job, &case, When::Final).expect("covered")
        };
        let (level, away) = (of(0.0), of(1.5));
        assert!((level.shortening_mpa - away.shortening_mpa).abs() < 1e-12);
        if method != En1992 {
            assert_eq!(level, away, "{method:?}");
        }
    }
}

#[test]
fn what_is_not_known_is_said() {
    let mut thin = case();
    thin.notional_thickness_mm = None;
    for method in [En1992, Aci423, As3600] {
        let refused = Method::new(method, &job(), &thin, When::Final).err();
        assert!(
            matches!(refused, Some(NoLoss::ThicknessUnknown(_))),
            "{method:?}"
        );
    }
    for method in [Direct, Aci423, Bs8110] {
        let refused = Method::new(method, &job(), &case(), When::Age(90.0)).err();
        assert!(matches!(refused, Some(NoLoss::FinalOnly(_))), "{method:?}");
    }
    let bare = Job::default().long_term;
    let refused = Method::new(As3600, &bare, &case(), When::Final).err();
    assert!(matches!(
        refused,
        Some(NoLoss::NotGiven("basic_relaxation", _))
    ));
}
