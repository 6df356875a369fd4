using ModelLab.Projects.Comments;
using ModelLab.Projects.Datasets;
using ModelLab.Projects.Findings;
using ModelLab.Projects.Opening;
using ModelLab.Projects.Paths;
using ModelLab.Projects.People;
using ModelLab.Projects.Revisions;
using ModelLab.Projects.Sources;

namespace ModelLab.Web.Features.Demo;

/// <summary>The use cases that the demo goes through: the same as behind the pages and the HTTP API.</summary>
public sealed record DemoUseCases(
    OpenProject Open, ManageMembers Members, ReceiveSource Receive, DescribeVariable Describe, StartPath Start, RunPathAgain RunAgain,
    TakeDecision Decide, ReadRevision Read, ManageComments Comments, ManageFindings Findings);
