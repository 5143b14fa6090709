//! petgraph's visit traits over a stored network, so that its algorithms run without a copy.
//!
//! Nodes are compounds, edges are steps, both by number. Small networks can also be had as an
//! ordinary petgraph graph: [`Network::to_graph`].

use petgraph::graph::DiGraph;
use petgraph::visit::{
    Data, EdgeRef, GraphBase, IntoEdgeReferences, IntoEdges, IntoNeighbors, IntoNodeIdentifiers, NodeCount,
    NodeIndexable, Visitable,
};

use super::store::{CompoundId, Network, Step};

/// A step as petgraph sees it.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct StepRef(pub Step);

impl GraphBase for Network {
    type NodeId = CompoundId;
    type EdgeId = usize;
}

impl Data for Network {
    type NodeWeight = ();
    type EdgeWeight = ();
}

impl NodeCount for Network {
    fn node_count(&self) -> usize {
        self.n_compounds()
    }
}

impl NodeIndexable for Network {
    fn node_bound(&self) -> usize {
        self.n_compounds()
    }

    fn to_index(&self, compound: CompoundId) -> usize {
        compound as usize
    }

    fn from_index(&self, index: usize) -> CompoundId {
        index as CompoundId
    }
}

impl Visitable for Network {
    type Map = visited::Visited;

    fn visit_map(&self) -> Self::Map {
        visited::Visited::new(self.n_compounds())
    }

    fn reset_map(&self, map: &mut Self::Map) {
        *map = self.visit_map();
    }
}

/// A set of compounds.
mod visited {
    use petgraph::visit::VisitMap;

    use crate::network::CompoundId;

    /// One flag a compound.
    #[derive(Debug, Clone)]
    pub struct Visited(Vec<bool>);

    impl Visited {
        pub(super) fn new(n: usize) -> Visited {
            Visited(vec![false; n])
        }
    }

    impl VisitMap<CompoundId> for Visited {
        fn visit(&mut self, compound: CompoundId) -> bool {
            !std::mem::replace(&mut self.0[compound as usize], true)
        }

        fn is_visited(&self, compound: &CompoundId) -> bool {
            self.0[*compound as usize]
        }

        fn unvisit(&mut self, compound: CompoundId) -> bool {
            std::mem::replace(&mut self.0[compound as usize], false)
        }
    }
}

impl IntoNodeIdentifiers for &Network {
    type NodeIdentifiers = std::ops::Range<CompoundId>;

    fn node_identifiers(self) -> Self::NodeIdentifiers {
        0..self.n_compounds() as CompoundId
    }
}

impl<'a> IntoNeighbors for &'a Network {
    type Neighbors = Box<dyn Iterator<Item = CompoundId> + 'a>;

    fn neighbors(self, compound: CompoundId) -> Self::Neighbors {
        Box::new(self.steps_from(compound).map(|step| step.to))
    }
}

impl EdgeRef for StepRef {
    type NodeId = CompoundId;
    type EdgeId = usize;
    type Weight = ();

    fn source(&self) -> CompoundId {
        self.0.from
    }

    fn target(&self) -> CompoundId {
        self.0.to
    }

    fn weight(&self) -> &() {
        &()
    }

    fn id(&self) -> usize {
        self.0.index
    }
}

impl<'a> IntoEdgeReferences for &'a Network {
    type EdgeRef = StepRef;
    type EdgeReferences = Box<dyn Iterator<Item = StepRef> + 'a>;

    fn edge_references(self) -> Self::EdgeReferences {
        Box::new(self.steps().map(StepRef))
    }
}

impl<'a> IntoEdges for &'a Network {
    type Edges = Box<dyn Iterator<Item = StepRef> + 'a>;

    fn edges(self, compound: CompoundId) -> Self::Edges {
        Box::new(self.steps_from(compound).map(StepRef))
    }
}

impl Network {
    /// The network as an ordinary petgraph graph: compounds by number, steps as they are.
    pub fn to_graph(&self) -> DiGraph<CompoundId, Step> {
        let mut graph = DiGraph::with_capacity(self.n_compounds(), self.n_steps());
        let nodes: Vec<_> = self.node_identifiers().map(|compound| graph.add_node(compound)).collect();
        for step in self.steps() {
            graph.add_edge(nodes[step.from as usize], nodes[step.to as usize], step);
        }
        graph
    }
}
