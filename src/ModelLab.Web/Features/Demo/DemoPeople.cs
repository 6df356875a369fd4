using ModelLab.Projects.People;
using ModelLab.Store.Server;

namespace ModelLab.Web.Features.Demo;

/// <summary>The three people of the demo. They are invented; nobody of these names is meant.</summary>
/// <param name="Analyst">Takes the decisions.</param>
/// <param name="Supervisor">Owns the project, reviews, and manages the people of the demo server.</param>
/// <param name="Evaluator">Reviews from outside.</param>
public sealed record DemoPeople(Person Analyst, Person Supervisor, Person Evaluator)
{
    /// <summary>Address of the analyst.</summary>
    public const string AnalystEmail = "analyst@marrowvale.example";

    /// <summary>Address of the supervisor.</summary>
    public const string SupervisorEmail = "supervisor@marrowvale.example";

    /// <summary>Address of the evaluator.</summary>
    public const string EvaluatorEmail = "evaluator@marrowvale.example";

    /// <summary>Gives the three an account. None has a password: nobody can sign in as one of them from elsewhere.</summary>
    public static async Task<DemoPeople> EnrolAsync(ServerRecords records, CancellationToken cancellation)
    {
        // A start that was broken off may have left some of them.
        var known = await records.PeopleAsync(cancellation);
        async Task<Person> Enrol(string name, string email, bool administrator) =>
            known.FirstOrDefault(p => p.Email == email) ?? (await records.EnrolAsync(ServerRecords.CommandLineActor, name, email, administrator, cancellation)).Person;

        return new DemoPeople(
            await Enrol("Ines Halloway", AnalystEmail, administrator: false),
            await Enrol("Marcus Oyelade", SupervisorEmail, administrator: true),
            await Enrol("Petra Lindholm", EvaluatorEmail, administrator: false));
    }
}
