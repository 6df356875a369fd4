using ModelLab.Projects.People;
using ModelLab.Store.Server;

namespace ModelLab.Web.Features.Demo;

/// <summary>Makes the demo project Marrow Vale: three people, two uploads, four paths, and what was said about them.</summary>
public sealed class DemoLoader(ServerRecords records, DemoUseCases uses) : IDemoLoader
{
    /// <inheritdoc/>
    public async Task LoadAsync(CancellationToken cancellation)
    {
        var people = await DemoPeople.EnrolAsync(records, cancellation);
        var owner = new Caller(people.Supervisor.Id);
        var project = await uses.Open.ExecuteAsync(
            owner,
            "Marrow Vale insulation grants",
            "How much heating energy did each insulation measure save from October to April in the homes that had a grant from the council, other things equal? "
            + "The answer helps to decide which measures are offered next. Homes without a grant are not in the register.",
            cancellation);
        await uses.Members.AddAsync(owner, project.Id, people.Analyst.Email, Role.Analyst, "Does the analysis.", cancellation);
        await uses.Members.AddAsync(owner, project.Id, people.Evaluator.Email, Role.Reviewer, "Reviews for the evaluation team.", cancellation);
        await new DemoStory(Actor(people.Analyst), Actor(people.Supervisor), Actor(people.Evaluator), project.Id).PlayAsync(cancellation);

        DemoActor Actor(Person person) => new(uses, project.Id, person);
    }
}
