//! Temperatures of a chain on a solved field; the closed-form cone solves none.

use crate::{
    estimate::{
        Chain, FacePoint, Failure, Temperatures,
        chain::{Model, elastic::Solved},
    },
    resistance::columns::{Across, Section},
};

impl Chain<'_> {
    /// Temperatures of a case at nominal, at a glance.
    pub fn temperatures(&self, case: usize) -> Result<Option<Temperatures>, Failure> {
        let solved = self.solved(case)?;
        Ok(solved.map(|solved| {
            let mut found = solved.temperatures();
            found.names = self.joint().plates.iter().map(|p| p.name.clone()).collect();
            let [x, y, _] = &mut found.hottest_at;
            [*x, *y] = self.joint().warm().own([*x, *y]);
            found
        }))
    }

    /// Both faying faces of the first interface at points in joint coordinates, first case at nominal.
    pub fn face_points(
        &self,
        points: &[[f64; 2]],
    ) -> Result<Option<Vec<Option<FacePoint>>>, Failure> {
        self.face_points_in(0, points)
    }

    /// The same of any interface, counted from the warm side.
    pub fn face_points_in(
        &self,
        interface: usize,
        points: &[[f64; 2]],
    ) -> Result<Option<Vec<Option<FacePoint>>>, Failure> {
        let solved = self.solved(0)?;
        Ok(solved.map(|solved| solved.face_points(points, interface)))
    }

    /// Temperatures on a line through the stack, first case at nominal, per watt above the mean
    /// sink surface; warm side first.
    pub fn section(&self, across: Across) -> Result<Option<Vec<Section>>, Failure> {
        let solved = self.solved(0)?;
        Ok(solved.and_then(|solved| solved.section(across)))
    }

    /// What zones too narrow for the grid may leave out of source to sink, first case at nominal, K/W.
    pub(in crate::estimate) fn left_out(&self) -> Result<f64, Failure> {
        Ok(self.solved(0)?.map_or(0.0, Solved::left_out))
    }

    fn solved(&self, case: usize) -> Result<Option<&dyn Solved>, Failure> {
        match &self.model {
            Model::Cone(_) => Ok(None),
            Model::Elastic(model) => model.of_case(self, case).map(Some),
        }
    }
}
