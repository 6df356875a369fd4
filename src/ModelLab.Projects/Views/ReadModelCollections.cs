namespace ModelLab.Projects.Views;

/// <summary>The collections of the read model: the name under which each type of document is stored.</summary>
public static class ReadModelCollections
{
    /// <summary>Collection name by document type. Names are stored and never change.</summary>
    public static IReadOnlyDictionary<Type, string> Names { get; } = new Dictionary<Type, string>
    {
        [typeof(ProjectView)] = "project",
        [typeof(MemberView)] = "member",
        [typeof(SourceView)] = "source",
        [typeof(DatasetView)] = "dataset",
        [typeof(VariableView)] = "variable",
        [typeof(PreparationView)] = "preparation",
        [typeof(PathView)] = "path",
        [typeof(RevisionView)] = "revision",
        [typeof(CommentView)] = "comment",
        [typeof(FindingView)] = "finding",
    };
}
