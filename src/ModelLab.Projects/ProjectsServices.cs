using Microsoft.Extensions.DependencyInjection;
using ModelLab.Projects.Comments;
using ModelLab.Projects.Datasets;
using ModelLab.Projects.Findings;
using ModelLab.Projects.Modelling;
using ModelLab.Projects.Opening;
using ModelLab.Projects.Paths;
using ModelLab.Projects.People;
using ModelLab.Projects.Preparations;
using ModelLab.Projects.Records;
using ModelLab.Projects.Replaying;
using ModelLab.Projects.Revisions;
using ModelLab.Projects.Sources;
using ModelLab.Projects.Storage;

namespace ModelLab.Projects;

/// <summary>Registers the use cases. The host registers the store, the vault, the people and the clock.</summary>
public static class ProjectsServices
{
    /// <summary>Adds all use cases; they hold no state of their own.</summary>
    public static IServiceCollection AddModelLabProjects(this IServiceCollection services) => services
        .AddSingleton<IReadModelSource>(s => s.GetRequiredService<IProjectStore>())
        .AddSingleton(_ => new ColumnCache())
        .AddSingleton<DatasetColumns>()
        .AddSingleton<AnalysisDataLoader>()
        .AddSingleton<VariableStates>()
        .AddSingleton<PreparationBuilder>()
        .AddSingleton<CarriedRows>()
        .AddSingleton<PathDesk>()
        .AddSingleton<RevisionReader>()
        .AddSingleton<ProjectGate>()
        .AddSingleton<OpenProject>()
        .AddSingleton<ReadProjects>()
        .AddSingleton<ManageMembers>()
        .AddSingleton<ReceiveSource>()
        .AddSingleton<ReadSources>()
        .AddSingleton<ReadDataset>()
        .AddSingleton<DescribeVariable>()
        .AddSingleton<MakePreparation>()
        .AddSingleton<StartPath>()
        .AddSingleton<TakeDecision>()
        .AddSingleton<ChooseByRule>()
        .AddSingleton<RunPathAgain>()
        .AddSingleton<ReadRevision>()
        .AddSingleton<ManageComments>()
        .AddSingleton<ManageFindings>()
        .AddSingleton<ReadLedger>()
        .AddSingleton<ReplayProject>();
}
