export { type Me, me } from './me';
export { listMembers, type Member } from './members';
export { currentTeam, type TeamOfUser, teamsOfUser } from './memberships';
export { updateTeam } from './update';
