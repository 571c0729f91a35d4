//! The earth stage: soils made ready for frequencies, kept while soil and the wires' rough extent stay.

use std::collections::HashMap;
use std::fmt;
use std::sync::{Arc, Mutex, PoisonError};

use physics::earth::{EarthError, HalfSpace, Reach, Soil};

/// One soil at the frequencies that have been asked for.
pub(in crate::evaluate) struct Earths {
    soil: Soil,
    reach: Reach,
    /// By the bits of the frequency in Hz.
    ready: Mutex<HashMap<u64, Arc<HalfSpace>>>,
}

/// Steps of the reach that earths are made for: a wire's end can be drawn a good way before anything is made anew.
const DISTANCE_STEP: f64 = 1.5;
const HEIGHT_STEP: f64 = 2.0;

impl Earths {
    /// An earth for wires of a reach, with nothing made yet.
    ///
    /// It is made for a rounded reach that depends on nothing but the wires', so that numbers never depend on what was
    /// asked before.
    fn new(soil: Soil, reach: &Reach) -> Self {
        Self { soil, reach: rounded(reach), ready: Mutex::default() }
    }

    /// A kept earth where it serves, else a new one.
    pub fn fitting(kept: Option<&Arc<Self>>, soil: Soil, reach: &Reach) -> Arc<Self> {
        match kept {
            Some(kept) if kept.soil == soil && kept.reach == rounded(reach) => Arc::clone(kept),
            _ => Arc::new(Self::new(soil, reach)),
        }
    }

    /// The earth at a frequency.
    pub fn at(&self, frequency_hz: f64) -> Result<Arc<HalfSpace>, EarthError> {
        let key = frequency_hz.to_bits();
        let lock = || self.ready.lock().unwrap_or_else(PoisonError::into_inner);
        if let Some(earth) = lock().get(&key) {
            return Ok(Arc::clone(earth));
        }
        // Made outside the lock: other threads make theirs meanwhile.
        let earth = Arc::new(HalfSpace::for_wires(&self.soil, frequency_hz, &self.reach)?);
        lock().insert(key, Arc::clone(&earth));
        Ok(earth)
    }
}

impl fmt::Debug for Earths {
    fn fmt(&self, formatter: &mut fmt::Formatter<'_>) -> fmt::Result {
        formatter
            .debug_struct("Earths")
            .field("soil", &self.soil)
            .field("reach", &self.reach)
            .finish_non_exhaustive()
    }
}

fn rounded(reach: &Reach) -> Reach {
    let up = |x: f64, step: f64| step.powf((x.ln() / step.ln()).ceil());
    let down = |x: f64, step: f64| step.powf((x.ln() / step.ln()).floor());
    Reach {
        rho_max_m: up(reach.rho_max_m.max(1.0), DISTANCE_STEP),
        zeta_min_m: down(reach.zeta_min_m, HEIGHT_STEP),
        zeta_max_m: up(reach.zeta_max_m, DISTANCE_STEP),
    }
}
