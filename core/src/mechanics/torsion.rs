//! Torsion: the energy of one dihedral angle about one bond.

use super::energy::KJ_PER_KCAL;
use super::{EnergyAlongAngle, EnergyAndGradient, MechanicsError};
use crate::float;
use crate::geometry::{Vector, dihedral};

/// Largest magnitude of a torsion barrier, kJ/mol.
///
/// Ten times a double bond, whose barrier of some 270 kJ/mol is the highest there is: what is larger is a slip
/// of units.
pub(super) const LARGEST_BARRIER_KJ_PER_MOL: f64 = 3e3;

/// A torsion term: three-term Fourier series in the dihedral angle, kJ/mol.
///
/// `E(omega) = ½ [V1 (1 + cos omega) + V2 (1 - cos 2 omega) + V3 (1 + cos 3 omega)]`
///
/// The ½ is there: `V_n` is the height of its own term. `omega = 0` is cis (eclipsed), `omega = pi` is trans
/// (anti), the sign after IUPAC as in [`crate::geometry::dihedral`]; the energy does not depend on the sign. With
/// positive `V1` the cis side is the higher one, with positive `V2` the planar arrangements are the lower ones, with
/// positive `V3` the staggered ones. The zero is the trans arrangement, whatever the barriers; elsewhere the energy may be
/// negative.
///
/// One term is one chain of four atoms: a methyl barrier measured as a whole is spread over the chains about the
/// bond, or given to one term that stands for all.
///
/// # Source
/// `allinger-1977` (the same three terms).
///
/// ```
/// use tautring_core::mechanics::Torsion;
///
/// let methyl = Torsion::new([0.0, 0.0, 12.0])?;
/// let eclipsed = methyl.energy(0.0)?;
/// let staggered = methyl.energy(60.0_f64.to_radians())?;
/// assert_eq!(eclipsed.energy_kj_per_mol, 12.0);
/// assert!(staggered.energy_kj_per_mol.abs() < 1e-12);
/// # Ok::<(), tautring_core::mechanics::MechanicsError>(())
/// ```
#[derive(Clone, Copy, Debug, PartialEq)]
#[cfg_attr(feature = "serde", derive(serde::Serialize))]
pub struct Torsion {
    barriers_kj_per_mol: [f64; 3],
}

impl Torsion {
    /// From the barriers `[V1, V2, V3]`, kJ/mol; any of them may be zero or negative.
    ///
    /// # Errors
    /// [`MechanicsError::TorsionBarrier`] for one that is no number or larger than 3000 kJ/mol.
    pub fn new(barriers_kj_per_mol: [f64; 3]) -> Result<Self, MechanicsError> {
        for (fold, value_kj_per_mol) in (1..).zip(barriers_kj_per_mol) {
            // Written so that NaN fails it.
            let usable = float::abs(value_kj_per_mol) <= LARGEST_BARRIER_KJ_PER_MOL;
            if !usable {
                return Err(MechanicsError::TorsionBarrier {
                    fold,
                    value_kj_per_mol,
                });
            }
        }
        Ok(Self {
            barriers_kj_per_mol,
        })
    }

    /// From the barriers `[V1, V2, V3]` in kcal/mol, thermochemical: 1 kcal is exactly 4.184 kJ.
    ///
    /// # Errors
    /// As [`Self::new`].
    pub fn from_kcal_per_mol(barriers: [f64; 3]) -> Result<Self, MechanicsError> {
        Self::new(barriers.map(|barrier| barrier * KJ_PER_KCAL))
    }

    /// The barriers `[V1, V2, V3]`, kJ/mol.
    pub const fn barriers_kj_per_mol(&self) -> [f64; 3] {
        self.barriers_kj_per_mol
    }

    /// Energy at a dihedral angle (radians), kJ/mol, with first and second derivative along the angle.
    ///
    /// Multiple angles come from Chebyshev polynomials in the cosine, so one sine and one cosine do.
    ///
    /// # Errors
    /// [`MechanicsError::DihedralNotFinite`] for NaN and infinities.
    pub fn energy(&self, dihedral_rad: f64) -> Result<EnergyAlongAngle, MechanicsError> {
        if !dihedral_rad.is_finite() {
            return Err(MechanicsError::DihedralNotFinite { dihedral_rad });
        }
        let [v1, v2, v3] = self.barriers_kj_per_mol;
        let (sine, cosine) = float::sin_cos(dihedral_rad);
        // cos 2w and cos 3w are T2 and T3 of cos w; sin 2w and sin 3w are sin w times U1 and U2.
        let square = cosine * cosine;
        let cosine2 = 2.0 * square - 1.0;
        let cosine3 = cosine * (4.0 * square - 3.0);
        let sine2 = sine * (2.0 * cosine);
        let sine3 = sine * (4.0 * square - 1.0);
        Ok(EnergyAlongAngle {
            energy_kj_per_mol: 0.5
                * (v1 * (1.0 + cosine) + v2 * (1.0 - cosine2) + v3 * (1.0 + cosine3)),
            slope_kj_per_mol_rad: 0.5 * (-v1 * sine + 2.0 * v2 * sine2 - 3.0 * v3 * sine3),
            curvature_kj_per_mol_rad2: 0.5
                * (-v1 * cosine + 4.0 * v2 * cosine2 - 9.0 * v3 * cosine3),
        })
    }

    /// Energy, kJ/mol, and its gradient, kJ/(mol·Å), for four positions (Å) along the chain.
    ///
    /// # Errors
    /// [`MechanicsError::Geometry`] for positions without a dihedral angle.
    ///
    /// ```
    /// use tautring_core::geometry::Vector;
    /// use tautring_core::mechanics::Torsion;
    ///
    /// let cis = Torsion::new([1.0, 0.0, 12.0])?.energy_and_gradient([
    ///     Vector::new(1.0, 0.0, 2.0),
    ///     Vector::new(0.0, 0.0, 1.5),
    ///     Vector::ZERO,
    ///     Vector::new(1.0, 0.0, -0.5),
    /// ])?;
    /// assert_eq!(cis.energy_kj_per_mol, 13.0);
    /// # Ok::<(), tautring_core::mechanics::MechanicsError>(())
    /// ```
    pub fn energy_and_gradient(
        &self,
        positions: [Vector; 4],
    ) -> Result<EnergyAndGradient<4>, MechanicsError> {
        let dihedral = dihedral(positions)?;
        let along = self.energy(dihedral.dihedral_rad)?;
        Ok(EnergyAndGradient::along(
            along.energy_kj_per_mol,
            along.slope_kj_per_mol_rad,
            dihedral.gradient_rad_per_angstrom,
        ))
    }
}
